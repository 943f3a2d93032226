import { Figure } from '@/components/figures/figure';
import { channelName } from '@/lib/capture-words';
import { describeFigure } from '@/lib/figures';
import type { ServedBody } from '../../api/record-queries';
import { mainKeysOf } from '../../model/part-words';

/** A part's main figures, each of every channel beside its name. */
export function PartFigures({ body }: { body: ServedBody }) {
  const keys = mainKeysOf(body);
  if (keys.length === 0) return <span className="bl-ink-2">curves only</span>;
  return (
    <dl className="bl-part-figures">
      {keys.map((key) => (
        <div key={key}>
          <dt>{labelOf(key)}</dt>
          <dd>
            {valuesOf(body, key).map(({ channel, value, limit }) => (
              <span key={channel} className="bl-part-value">
                {channel !== 'between' && <span className="bl-part-channel">{channelName(channel)} </span>}
                <Figure
                  figureKey={key}
                  value={value}
                  limit={limit}
                  integerCh={0}
                  fractionCh={0}
                  uncertaintyCh={0}
                  hasUnit
                />
              </span>
            ))}
          </dd>
        </div>
      ))}
    </dl>
  );
}

function labelOf(key: string): string {
  return describeFigure(key).label;
}

function valuesOf({ channels, between }: ServedBody, key: string) {
  const places = [...channels, { channel: 'between', figures: between.figures, limits: {} }];
  return places.flatMap(({ channel, figures, limits }) => {
    const value = figures[key];
    return value === undefined
      ? []
      : [{ channel, value, limit: (limits as ServedBody['channels'][number]['limits'])[key] ?? null }];
  });
}
