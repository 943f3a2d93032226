import { useState } from 'react';
import { Link } from 'react-router-dom';
import { Facts, MarginBlock } from '@/components/page/page';
import type { Fact } from '@/components/page/page';
import type { Capture } from '@/lib/api-schema';
import { bitsWords } from '@/lib/capture-words';
import { formatDateTime } from '@/lib/format/date';
import { formatNumber } from '@/lib/format/number';
import { formatBytes, formatCount, formatDuration, formatSampleRate, withUnit } from '@/lib/format/quantity';
import type { ServedRecord } from '../api/record-queries';
import { recognisedWords } from '../model/record-words';

/** Where the recording is from, and what it is. */
export function ProvenanceBlock({ capture, record }: { capture: Capture; record: ServedRecord | null }) {
  return (
    <MarginBlock title="Provenance">
      <Facts facts={factsOf(capture, record)} />
      {capture.sameBytesAs.length > 0 && (
        <p className="bl-capture-note">
          The same bytes as{' '}
          {capture.sameBytesAs.map(({ id, number }, index) => (
            <span key={id}>
              {index > 0 && ', '}
              <Link to={`/captures/${id}`}>capture {number}</Link>
            </span>
          ))}
          .
        </p>
      )}
    </MarginBlock>
  );
}

function factsOf(capture: Capture, record: ServedRecord | null): Fact[] {
  const facts: Fact[] = [
    { term: 'file', detail: <code>{capture.fileName}</code> },
    { term: 'size', detail: formatBytes(capture.sizeBytes) },
    {
      term: 'samples',
      detail: `${formatCount(capture.frameCount)} × ${capture.channelCount}, ${bitsWords(capture)}, ${formatSampleRate(capture.sampleRateHz)}`,
    },
    {
      term: 'arrived',
      detail: `${formatDateTime(capture.uploadedAt)}, from ${capture.uploadedBy.displayName}`,
    },
    { term: 'SHA-256', detail: <HashFact sha256={capture.sha256} /> },
  ];
  if (!record) return facts;
  facts.push({ term: 'taken for', detail: recognisedWords(record) });
  const { stimulus } = record;
  if (stimulus && stimulus.delayS !== null)
    facts.push({ term: 'begins', detail: `at ${formatDuration(stimulus.delayS)}` });
  if (stimulus && stimulus.clockOffsetPpm !== null) {
    facts.push({
      term: 'clock',
      detail: `${withUnit(formatNumber(stimulus.clockOffsetPpm, { decimals: 1, isSigned: true }), 'ppm')} against the recorder`,
    });
  }
  if (stimulus?.polarity) facts.push({ term: 'polarity', detail: stimulus.polarity });
  return facts;
}

/** The whole hash, to be compared with another place's, and copied. */
function HashFact({ sha256 }: { sha256: string }) {
  const [isCopied, setIsCopied] = useState(false);
  return (
    <>
      <code className="bl-hash">{sha256}</code>{' '}
      <button
        type="button"
        className="bl-word"
        onClick={() => void navigator.clipboard.writeText(sha256).then(() => setIsCopied(true))}
      >
        {isCopied ? 'Copied' : 'Copy'}
        <span className="bl-hidden"> the SHA-256</span>
      </button>
    </>
  );
}
