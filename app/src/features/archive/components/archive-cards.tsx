import { Link } from 'react-router-dom';
import { limitOfMain } from '@/components/captures/main-figure';
import { Figure } from '@/components/figures/figure';
import type { Capture } from '@/lib/api-schema';
import { channelName, unitName, whatWasMeasured } from '@/lib/capture-words';
import { describeFigure } from '@/lib/figures';
import { ToNote } from '../model/archive-columns';
import { byDay } from '../model/chosen-rows';

export interface ArchiveCardsProps {
  captures: readonly Capture[];
  chosen: ReadonlySet<number>;
  canChoose: boolean;
  onChoose: (chosen: ReadonlySet<number>) => void;
}

/** The captures on a phone: by day, a whole row is the link. */
export function ArchiveCards({ captures, chosen, canChoose, onChoose }: ArchiveCardsProps) {
  const days = byDay(captures);
  const toggle = (number: number, isChosen: boolean) => {
    const next = new Set(chosen);
    if (isChosen) next.add(number);
    else next.delete(number);
    onChoose(next);
  };
  return (
    <div className="bl-archive-cards">
      {days.map(({ key, day, month, year, items }) => (
        <section key={key} aria-label={`${day} ${month} ${year}`}>
          <h3 className="bl-archive-card-day">
            {day} <span>{month}</span>
          </h3>
          <ul>
            {items.map((capture) => (
              <li key={capture.id} data-chosen={chosen.has(capture.number)}>
                {canChoose && (
                  <label className="bl-archive-card-choose">
                    <input
                      type="checkbox"
                      aria-label={`Choose capture ${capture.number}`}
                      checked={chosen.has(capture.number)}
                      onChange={(event) => toggle(capture.number, event.target.checked)}
                    />
                  </label>
                )}
                <ArchiveCard capture={capture} />
              </li>
            ))}
          </ul>
        </section>
      ))}
    </div>
  );
}

function ArchiveCard({ capture }: { capture: Capture }) {
  const { title, detail } = whatWasMeasured(capture);
  const main = capture.record?.mainFigure;
  return (
    <div className="bl-archive-card">
      <p className="bl-archive-card-head">
        <Link to={`/captures/${capture.id}`}>{title}</Link>
        <code>{capture.number}</code>
      </p>
      <p className="bl-table-second">
        {capture.unit
          ? [unitName(capture.unit), capture.condition?.name].filter(Boolean).join(', ')
          : 'unsorted'}
      </p>
      <p className="bl-table-second">{detail}</p>
      <p className="bl-archive-card-foot">
        {main && (
          <span>
            {describeFigure(main.key).label}, {channelName(main.channel)}{' '}
            <Figure
              figureKey={main.key}
              value={main.value}
              integerCh={0}
              fractionCh={0}
              uncertaintyCh={0}
              hasUnit
              limit={limitOfMain(main)}
            />
          </span>
        )}
        <ToNote capture={capture} />
      </p>
    </div>
  );
}
