import { channelName } from '@/lib/capture-words';
import { formatFrequency } from '@/lib/format/quantity';
import type { JitterPair } from '../../model/jitter-model';
import { LineLevel } from './line-level';
import { LineTable } from './line-table';

const KIND_WORDS: Readonly<Record<string, string>> = {
  phase: 'the time moves: jitter',
  amplitude: 'the level moves: no jitter',
  mixed: 'both move',
};
const HEADS = [
  { text: 'channel' },
  { text: 'distance', isNumber: true },
  { text: 'level', isNumber: true },
  { text: 'what moves' },
];

/** Sideband pairs: how far from the tone, how strong, and whether time or level moves. */
export function PairsTable({ pairs }: { pairs: readonly JitterPair[] }) {
  if (pairs.length === 0)
    return <p className="bl-ink-2">None stands 10 dB over the noise beside the tone.</p>;
  return (
    <LineTable label="Table of pairs" heads={HEADS}>
      {pairs.map(({ channel, offsetHz, levelDbr, kind }) => (
        <tr key={`${channel}-${offsetHz}`}>
          <th scope="row">{channelName(channel)}</th>
          <td className="bl-table-number bl-mono">{formatFrequency(offsetHz, 1)}</td>
          <td className="bl-table-number">
            <LineLevel figureKey="levelDbr" value={levelDbr} />
          </td>
          <td>{KIND_WORDS[kind] ?? kind}</td>
        </tr>
      ))}
    </LineTable>
  );
}
