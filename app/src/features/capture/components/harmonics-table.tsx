import { Figure } from '@/components/figures/figure';
import { channelName } from '@/lib/capture-words';
import { formatFrequency } from '@/lib/format/quantity';
import type { ServedBody } from '../api/record-queries';

/** Each harmonic against the fundamental; what stands in the noise has a dash. */
export function HarmonicsTable({ record }: { record: ServedBody }) {
  const channels = record.channels.filter(({ harmonics }) => harmonics.length > 0);
  const orders = [...new Set(channels.flatMap(({ harmonics }) => harmonics.map(({ order }) => order)))].sort(
    (a, b) => a - b,
  );
  if (orders.length === 0) return null;
  return (
    <div className="bl-table-scroll bl-harmonics" tabIndex={0} role="region" aria-label="Table of harmonics">
      <table className="bl-table">
        <thead>
          <tr>
            <th scope="col">harmonic</th>
            {orders.map((order) => (
              <th key={order} scope="col" className="bl-table-number bl-mono">
                {order}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {channels.map(({ channel, harmonics }) => (
            <tr key={channel}>
              <th scope="row">
                {channelName(channel)} <span className="bl-ink-2">dBr</span>
              </th>
              {orders.map((order) => {
                const harmonic = harmonics.find((one) => one.order === order);
                return (
                  <td
                    key={order}
                    className="bl-table-number"
                    title={harmonic && formatFrequency(Math.round(harmonic.frequencyHz))}
                  >
                    {harmonic && (
                      <Figure
                        figureKey="harmonicLevelDbr"
                        value={harmonic.levelDbr}
                        missingWhy="It stands in the noise"
                        integerCh={harmonic.levelDbr === null ? 1 : 4}
                        fractionCh={harmonic.levelDbr === null ? 0 : 2}
                        uncertaintyCh={0}
                        hasWorth={harmonic.levelDbr === null}
                      />
                    )}
                  </td>
                );
              })}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
