import { Button } from '@radix-ui/themes';
import { useState } from 'react';
import { Link } from 'react-router-dom';
import { ConfirmDialog } from '@/components/forms/confirm-dialog';
import { downloadBlob } from '@/components/charts/download-blob';
import { MarginBlock, WarningBlock } from '@/components/page/page';
import { channelName } from '@/lib/capture-words';
import { describeFigure } from '@/lib/figures';
import { formatFigureLine } from '@/lib/format/figure';
import { formatDateTime } from '@/lib/format/date';
import { formatCounted, formatDuration, formatPercent } from '@/lib/format/quantity';
import type { Sending } from '../hooks/use-archive-takes';
import { useLiveBench } from '../hooks/live-bench-context';
import type { Agreement } from '../model/archive-take';
import { seriesOf, spreadsOf, type Spread } from '../model/spread';
import type { LocalTake } from '../model/take';

interface TakesBlockProps {
  takes: readonly LocalTake[];
  sent: readonly LocalTake[];
  sendings: Readonly<Record<string, Sending>>;
  openId: string | null;
  onOpen: (id: string | null) => void;
  onKeep: (take: LocalTake) => void;
}

/** What was taken: held in this browser until it is kept or thrown away. */
export function TakesBlock({ takes, sent, sendings, openId, onOpen, onKeep }: TakesBlockProps) {
  const bench = useLiveBench();
  const [doomed, setDoomed] = useState<LocalTake | null>(null);
  const all = [...takes, ...sent.filter(({ id }) => takes.every((one) => one.id !== id))];
  if (all.length === 0) return null;
  return (
    <MarginBlock title="Takes">
      <ul className="bl-live-takes">
        {all.map((take) => (
          <li key={take.id}>
            <p>
              <button
                type="button"
                className="bl-word"
                aria-pressed={openId === take.id}
                onClick={() => onOpen(openId === take.id ? null : take.id)}
              >
                {take.title}
              </button>{' '}
              <span className="bl-ink-2">
                {formatDateTime(take.madeAt)}
                {take.record && `, ${formatDuration(take.record.capture.durationS)}`}
                {take.statement.isPractice && ', practice'}
              </span>
            </p>
            <TakeState take={take} sending={sendings[take.id]} />
            {!take.isKept && sendings[take.id] === undefined && (
              <p className="bl-live-words">
                <Button variant="surface" color="gray" highContrast onClick={() => onKeep(take)}>
                  Keep
                </Button>
                <button
                  type="button"
                  className="bl-word"
                  onClick={() => downloadBlob(take.wav, take.fileName)}
                >
                  Download
                </button>
                <button type="button" className="bl-word" onClick={() => setDoomed(take)}>
                  Throw away
                </button>
              </p>
            )}
          </li>
        ))}
      </ul>
      {seriesOf(all).map(({ id, title, records }) => (
        <SeriesSpread key={id} title={title} spreads={spreadsOf(records)} count={records.length} />
      ))}
      <ConfirmDialog
        isOpen={doomed !== null}
        onOpenChange={() => setDoomed(null)}
        title="Throw this take away?"
        confirmLabel="Throw it away"
        isDestructive
        onConfirm={() => {
          if (doomed) {
            if (openId === doomed.id) onOpen(null);
            void bench.remove(doomed.id);
          }
          setDoomed(null);
        }}
      >
        It is in this browser alone. Its recording and its figures can’t be had back.
      </ConfirmDialog>
    </MarginBlock>
  );
}

/** What repeats tell: how far a single take may lie from the next. */
function SeriesSpread({
  title,
  spreads,
  count,
}: {
  title: string;
  spreads: readonly Spread[];
  count: number;
}) {
  return (
    <>
      <p>
        <strong>
          {formatCounted(count, 'repeat')} of {title}
        </strong>
      </p>
      <ul className="bl-live-notes">
        {spreads.map(({ key, channel, mean, deviation }) => {
          const { label } = describeFigure(key);
          return (
            <li key={`${key}-${channel}`}>
              {label}, {channelName(channel)}: {formatFigureLine(key, { value: mean })}, spread{' '}
              {deviation.toPrecision(2)}
            </li>
          );
        })}
      </ul>
    </>
  );
}

function TakeState({ take, sending }: { take: LocalTake; sending: Sending | undefined }) {
  const damaged = take.statement.breaks.length;
  return (
    <div role="status">
      {take.failure && <p className="bl-ink-2">Not measured: {take.failure}. Its recording is whole.</p>}
      {damaged > 0 && (
        <p className="bl-ink-2">
          {formatCounted(damaged, 'damaged block')}
          {take.statement.settings['fromS'] === undefined ? ' in it' : ', left out of the figures'}
        </p>
      )}
      {take.isOverloaded && <p className="bl-ink-2">The input reached the end of its scale.</p>}
      {sending === undefined && !take.isKept && <p className="bl-ink-2">in this browser alone</p>}
      {sending?.kind === 'sending' && <p>On its way, {formatPercent(sending.share)}</p>}
      {sending?.kind === 'waiting' && <p>Kept here until it can be sent. {sending.why}</p>}
      {sending?.kind === 'stored' && (
        <>
          <p>
            <Link to={`/captures/${sending.capture.id}`}>Capture {sending.capture.number}</Link> in the
            archive
          </p>
          <AgreementWords agreement={sending.agreement} />
        </>
      )}
    </div>
  );
}

const MOST_NAMED = 5;

function AgreementWords({ agreement }: { agreement: Agreement | null }) {
  if (agreement === null) return <p className="bl-ink-2">The server measures the stored bytes.</p>;
  if (agreement.kind === 'agrees') {
    return <p>The server gets the same from the stored bytes, key by key, within a millionth of a dB.</p>;
  }
  if (agreement.kind === 'failed') {
    return (
      <WarningBlock tone="fault" lead="Not compared.">
        {agreement.why}
      </WarningBlock>
    );
  }
  return (
    <WarningBlock
      tone="fault"
      lead={`${formatCounted(agreement.differing.length, 'key')} came out otherwise:`}
    >
      {agreement.differing.slice(0, MOST_NAMED).map(({ path, stored, computed }, index) => (
        <span key={path}>
          {index > 0 && '; '}
          <code>{path}</code> is {JSON.stringify(stored)} there, {JSON.stringify(computed)} here
        </span>
      ))}
      .
    </WarningBlock>
  );
}
