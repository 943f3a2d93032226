import { channelName } from '@/lib/capture-words';
import { formatFrequency } from '@/lib/format/quantity';
import type { ServedBody } from '../../api/record-queries';
import { LineLevel } from './line-level';
import { LineTable } from './line-table';

const KIND_WORDS: Readonly<Record<string, string>> = {
  mains: 'mains or a multiple of it',
  frame: 'the clock of a data link, or a multiple of it',
  unknown: 'not known',
};
const HEADS = [
  { text: 'channel' },
  { text: 'frequency', isNumber: true },
  { text: 'level', isNumber: true },
  { text: 'what it is' },
];

/** Hum and whistles of a channel without signal. */
export function IdleLines({ channels }: Pick<ServedBody, 'channels'>) {
  const lines = channels.flatMap(({ channel, components }) =>
    components.flatMap(({ frequencyHz, levelDbfs, kind }) =>
      typeof frequencyHz === 'number' && typeof levelDbfs === 'number'
        ? [{ channel, frequencyHz, levelDbfs, kind: String(kind) }]
        : [],
    ),
  );
  if (lines.length === 0) return <p className="bl-ink-2">None stands out.</p>;
  return (
    <LineTable label="Table of lines above the noise" heads={HEADS}>
      {lines.map(({ channel, frequencyHz, levelDbfs, kind }) => (
        <tr key={`${channel}-${frequencyHz}`}>
          <th scope="row">{channelName(channel)}</th>
          <td className="bl-table-number bl-mono">{formatFrequency(frequencyHz, 1)}</td>
          <td className="bl-table-number">
            <LineLevel figureKey="levelDbfs" value={levelDbfs} />
          </td>
          <td>{KIND_WORDS[kind] ?? kind}</td>
        </tr>
      ))}
    </LineTable>
  );
}
