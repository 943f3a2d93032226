import { Section } from '@/components/page/page';
import { formatDuration, formatLevel } from '@/lib/format/quantity';
import { measureWords } from '../model/measure-words';
import type { StimulusPreview } from '../worker/preview';

const CHANNEL_WORDS = { both: 'both', left: 'left alone', right: 'right alone' } as const;

/** The parts of a file in the order played, and what each yields. */
export function StimulusContents({ preview }: { preview: StimulusPreview }) {
  const { parts, marks } = preview.descriptor;
  return (
    <Section
      title="In the order played"
      sub={
        marks.length === 0
          ? 'no lead-in and no marks'
          : 'after a lead-in of 2 s at −40 dBFS and a pair of marks'
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
    </Section>
  );
}

function levelWords({ steps, parameters }: StimulusPreview['descriptor']['parts'][number]): string {
  const [first] = steps;
  const last = steps.at(-1);
  if (first && last && steps.length > 1) {
    return `${steps.length} steps, ${formatLevel(first.levelDbfs)} to ${formatLevel(last.levelDbfs)}`;
  }
  const level = first?.levelDbfs ?? parameters['levelDbfs'];
  return typeof level === 'number' ? formatLevel(level) : 'digital zero';
}
