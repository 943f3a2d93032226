import { Link } from 'react-router-dom';
import { analysisStations } from '@/components/captures/capture-lines';
import { TheLine } from '@/components/line/the-line';
import type { Station } from '@/components/line/the-line';
import { errorWords, offsetWords } from '@/lib/error-words';
import { formatBytes, formatDuration, formatPercent, formatSampleRate } from '@/lib/format/quantity';
import { bitsWords, unitName } from '@/lib/capture-words';
import { isOnItsWay, secondsLeft } from '../model/upload-entry';
import type { UploadEntry } from '../model/upload-entry';

const NOT_YET: Station[] = [
  { name: 'samples', what: 'samples', node: 'not-yet' },
  { name: 'dsp', what: 'dsp', node: 'not-yet' },
  { name: 'record', what: 'record', node: 'not-yet', grow: 0.7 },
];

export interface UploadRowProps {
  entry: UploadEntry;
  onCancel: () => void;
  onRetry: () => void;
  onPutAway: () => void;
}

/** One file on its way: its line, what is true of it in words, and what can be done. */
export function UploadRow({ entry, onCancel, onRetry, onPutAway }: UploadRowProps) {
  const { file, capture } = entry;
  return (
    <li className="bl-arriving-row">
      <div>
        <strong className="bl-arriving-name">{file.name}</strong>
        <span className="bl-table-second">{factsOf(entry)}</span>
      </div>
      <div>
        <TheLine isCompact label={`Where ${file.name} is`} stations={stationsOf(entry)} />
        <UploadNote entry={entry} />
      </div>
      <div className="bl-arriving-actions">
        {capture && <Link to={`/captures/${capture.id}`}>Capture {capture.number}</Link>}
        {isOnItsWay(entry) && (
          <button type="button" className="bl-word" onClick={onCancel} aria-label={`Cancel ${file.name}`}>
            Cancel
          </button>
        )}
        {(entry.phase === 'refused' || entry.phase === 'cancelled') && (
          <button type="button" className="bl-word" onClick={onRetry} aria-label={`Try ${file.name} again`}>
            Try again
          </button>
        )}
        {!isOnItsWay(entry) && (
          <button type="button" className="bl-word" onClick={onPutAway} aria-label={`Put ${file.name} away`}>
            Put away
          </button>
        )}
      </div>
    </li>
  );
}

function UploadNote({ entry: { capture, error } }: { entry: UploadEntry }) {
  if (error) {
    return (
      <p className="bl-arriving-note bl-arriving-fault">
        {errorWords(error)}{' '}
        <code>{[error.facts.reason ?? error.code, offsetWords(error)].filter(Boolean).join(', ')}</code>
      </p>
    );
  }
  if (!capture || capture.sameBytesAs.length === 0) return null;
  return (
    <p className="bl-arriving-note">
      The same bytes as{' '}
      {capture.sameBytesAs.map(({ id, number }, index) => (
        <span key={id}>
          {index > 0 && ', '}
          <Link to={`/captures/${id}`}>capture {number}</Link>
        </span>
      ))}
      : nothing is stored twice.
    </p>
  );
}

function factsOf({ file, capture }: UploadEntry): string {
  if (!capture) return formatBytes(file.size);
  const facts = [formatBytes(file.size), bitsWords(capture), formatSampleRate(capture.sampleRateHz)];
  if (capture.unit) facts.push(unitName(capture.unit));
  return facts.join(', ');
}

function stationsOf(entry: UploadEntry): Station[] {
  const { phase, file, sentBytes, capture, analysis } = entry;
  switch (phase) {
    case 'waiting':
      return [{ name: 'recording', what: 'waits for its turn', node: 'not-yet' }, ...NOT_YET];
    case 'sending':
      return [
        {
          name: 'recording',
          what: sendingWords(entry),
          node: 'here',
          link: 'share',
          share: sentBytes / file.size,
        },
        ...NOT_YET,
      ];
    case 'stored':
      return [
        { name: 'recording', what: 'all sent' },
        ...(capture && analysis ? analysisStations(capture, analysis) : NOT_YET),
      ];
    case 'refused':
      return [
        { name: 'recording', what: 'read' },
        { name: 'samples', what: 'not taken in', node: 'broken', tone: 'fault' },
      ];
    case 'cancelled':
      return [{ name: 'recording', what: 'cancelled, nothing was kept', node: 'broken' }];
  }
}

function sendingWords(entry: UploadEntry): string {
  const share = entry.sentBytes / entry.file.size;
  if (share >= 1) return 'all sent, being checked';
  const leftS = secondsLeft(entry, Date.now());
  const sent = `${formatPercent(share)} sent`;
  return leftS === null ? sent : `${sent}, about ${formatDuration(Math.max(1, Math.round(leftS)))} left`;
}
