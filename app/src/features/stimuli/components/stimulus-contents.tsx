import { LEAD_IN_LEVEL_DBFS } from '@benchlark/dsp';
import { Section } from '@/components/page/page';
import { formatNumber } from '@/lib/format/number';
import { formatDuration, formatLevel, withUnit } from '@/lib/format/quantity';
import { measureWords } from '../model/measure-words';
import type { StimulusPreview } from '../worker/preview';

const CHANNEL_WORDS = { both: 'both', left: 'left alone', right: 'right alone' } as const;

/** The parts of a file in the order played, and what each yields. */
export function StimulusContents({
  preview,
  ceilingDbfs,
}: {
  preview: StimulusPreview;
  /** No sound of the file goes above it, the lead-in included. */
  ceilingDbfs: number;
}) {
  const { parts, marks } = preview.descriptor;
  return (
    <Section
      title="In the order played"
      sub={
        marks.length === 0
          ? 'no lead-in and no marks'
          : `after a lead-in of 2 s at ${formatLevel(Math.min(LEAD_IN_LEVEL_DBFS, ceilingDbfs))} and a pair of marks`
      }
    >
      <div className="bl-stimulus-table" role="region" aria-label="Parts of the file" tabIndex={0}>
        <table className="bl-table">
          <thead>
            <tr>
              <th scope="col">from</th>
              <th scope="col">for</th>
              <th scope="col">channels</th>
              <th scope="col">levels</th>
              <th scope="col">yields</th>
            </tr>
          </thead>
          <tbody>
            {parts.map((part) => (
              <tr key={part.fromS}>
                <td>{formatDuration(part.fromS)}</td>
                <td>{formatDuration(part.toS - part.fromS)}</td>
                <td>{CHANNEL_WORDS[part.channels]}</td>
                <td>{levelWords(part)}</td>
                <td>{measureWords(part.measure)}</td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      {parts
        .filter(({ steps }) => steps.length > 1)
        .map((part) => (
          <StepTimes key={part.fromS} part={part} />
        ))}
    </Section>
  );
}

type Part = StimulusPreview['descriptor']['parts'][number];

const secondsOf = (timeS: number): string => withUnit(formatNumber(timeS, { decimals: 2 }), 's');

/** When each step begins, for whoever watches a recorder or cuts a recording by hand. */
function StepTimes({ part }: { part: Part }) {
  return (
    <details className="bl-stimuli-fold">
      <summary>
        The {part.steps.length} steps from {formatDuration(part.fromS)} on, with their times
      </summary>
      <div className="bl-stimulus-table" role="region" aria-label="Steps and their times" tabIndex={0}>
        <table className="bl-table">
          <thead>
            <tr>
              <th scope="col">step</th>
              <th scope="col">level</th>
              <th scope="col">from</th>
              <th scope="col">to</th>
            </tr>
          </thead>
          <tbody>
            {part.steps.map(({ levelDbfs, fromS, toS }, index) => (
              <tr key={fromS}>
                <td>{index + 1}</td>
                <td>{formatLevel(levelDbfs)}</td>
                <td>{secondsOf(fromS)}</td>
                <td>{secondsOf(toS)}</td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </details>
  );
}

function levelWords({ steps, parameters }: Part): string {
  const [first] = steps;
  const last = steps.at(-1);
  if (first && last && steps.length > 1) {
    return `${steps.length} steps, ${formatLevel(first.levelDbfs)} to ${formatLevel(last.levelDbfs)}`;
  }
  const level = first?.levelDbfs ?? parameters['levelDbfs'];
  return typeof level === 'number' ? formatLevel(level) : 'digital zero';
}
