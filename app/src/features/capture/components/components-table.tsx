import { Figure } from '@/components/figures/figure';
import { Section } from '@/components/page/page';
import { channelName } from '@/lib/capture-words';
import { formatFrequency } from '@/lib/format/quantity';
import type { ServedRecord } from '../api/record-queries';

const KIND_WORDS: Readonly<Record<string, string>> = {
  mains: 'mains or a multiple of it',
  frame: 'the clock of a data link, or a multiple of it',
  unknown: 'not known',
};

/** Lines that stand out of the noise and are no harmonics: hum, whistles. */
export function ComponentsTable({ record }: { record: ServedRecord }) {
  const lines = record.channels.flatMap(({ channel, components }) =>
    components.flatMap(({ frequencyHz, levelDbfs, kind }) =>
      typeof frequencyHz === 'number' && typeof levelDbfs === 'number'
        ? [{ channel, frequencyHz, levelDbfs, kind: String(kind) }]
        : [],
    ),
  );
  if (record.measure !== 'idle') return null;
  return (
    <Section title="Lines above the noise">
      {lines.length === 0 ? (
        <p className="bl-ink-2">None stands out.</p>
      ) : (
        <div
          className="bl-table-scroll"
          tabIndex={0}
          role="region"
          aria-label="Table of lines above the noise"
        >
          <table className="bl-table">
            <thead>
              <tr>
                <th scope="col">channel</th>
                <th scope="col" className="bl-table-number">
                  frequency
                </th>
                <th scope="col" className="bl-table-number">
                  level
                </th>
                <th scope="col">what it is</th>
              </tr>
            </thead>
            <tbody>
              {lines.map(({ channel, frequencyHz, levelDbfs, kind }) => (
                <tr key={`${channel}-${frequencyHz}`}>
                  <th scope="row">{channelName(channel)}</th>
                  <td className="bl-table-number bl-mono">{formatFrequency(frequencyHz, 1)}</td>
                  <td className="bl-table-number">
                    <Figure
                      figureKey="levelDbfs"
                      value={levelDbfs}
                      uncertaintyCh={0}
                      hasWorth={false}
                      hasUnit
                    />
                  </td>
                  <td>{KIND_WORDS[kind] ?? kind}</td>
                </tr>
              ))}
            </tbody>
          </table>
        </div>
      )}
    </Section>
  );
}
