import type { Finding } from '@benchlark/dsp';
import { Link, useSearchParams } from 'react-router-dom';
import { SeverityMark } from '@/components/figures/severity-mark';
import { Quantity } from '@/components/figures/quantity';
import { MarginBlock } from '@/components/page/page';
import { channelName } from '@/lib/capture-words';
import { decimalsForSignificant, formatNumber, MINUS } from '@/lib/format/number';
import { formatLevel, withUnit } from '@/lib/format/quantity';
import type { ServedRecord } from '../api/record-queries';
import { placeOfFinding } from '../model/finding-place';
import { partSearch } from '../model/part-address';

/** What the program proposes, each with what it rests on and what would confirm it. */
export function FindingsBlock({ record }: { record: ServedRecord }) {
  if (record.findings.length === 0) return null;
  return (
    <MarginBlock title="Proposed by the program">
      <ul className="bl-findings">
        {record.findings.map((finding, index) => (
          <li key={`${finding.code}-${index}`}>
            <FindingView finding={finding} record={record} />
          </li>
        ))}
      </ul>
    </MarginBlock>
  );
}

function FindingView({ finding, record }: { finding: Finding; record: ServedRecord }) {
  const { severity, summary, evidence, confirmBy } = finding;
  const where = whereWords(finding);
  return (
    <details className="bl-finding">
      <summary>
        <span className="bl-finding-lead">
          <SeverityMark severity={severity} hasWord />
          <span className="bl-finding-more">evidence</span>
        </span>
        <span className="bl-finding-summary">{summary.replace(/-(?=\d)/g, MINUS)}</span>
        {where && <span className="bl-ink-2">{where}</span>}
      </summary>
      {evidence.length > 0 && (
        <dl className="bl-finding-evidence">
          {evidence.map(({ figure, value, unit }) => (
            <div key={figure}>
              <dt>{figure}</dt>
              <dd>
                <Quantity text={evidenceText(value, unit)} />
              </dd>
            </div>
          ))}
        </dl>
      )}
      {confirmBy !== '' && (
        <p>
          <strong>What would confirm it:</strong> {confirmBy}
        </p>
      )}
      <EvidenceLink finding={finding} record={record} />
    </details>
  );
}

function EvidenceLink({ finding, record }: { finding: Finding; record: ServedRecord }) {
  const [params] = useSearchParams();
  const place = placeOfFinding(record, finding);
  if (place === null) return null;
  const to = { search: partSearch(params, place.part), hash: place.figure ? `#figure-${place.figure}` : '' };
  return (
    <p>
      <Link to={to}>{place.part === null ? 'Look at the figure' : `Look at part ${place.part}`}</Link>
    </p>
  );
}

/** Decibels to a tenth; other units to three digits. */
function evidenceText(value: number, unit: string): string {
  const decimals = unit.startsWith('dB') ? 1 : Math.max(0, decimalsForSignificant(value, 3));
  return withUnit(formatNumber(value, { decimals }), unit);
}

/** "left, negative half, from -2.4 dBFS played" */
function whereWords({ channel, half, fromStimulusDbfs, summary }: Finding): string {
  const isNamed = channel === null || summary.toLowerCase().includes(channelName(channel));
  return [
    isNamed ? null : channelName(channel),
    half === null ? null : `${half} half`,
    fromStimulusDbfs === null ? null : `from ${formatLevel(fromStimulusDbfs)} played`,
  ]
    .filter((part) => part !== null)
    .join(', ');
}
