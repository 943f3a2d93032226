import { channelName } from '@/lib/capture-words';
import { formatFrequency } from '@/lib/format/quantity';
import type { Product } from '../../model/two-tone-model';
import { LineLevel } from './line-level';
import { LineTable } from './line-table';

interface ProductsTableProps {
  products: readonly Product[];
  channels: readonly string[];
}

/** Each product of two tones with its level in every channel; a dash where it stands in the noise. */
export function ProductsTable({ products, channels }: ProductsTableProps) {
  if (products.length === 0) return <p className="bl-ink-2">None stands clear of the noise.</p>;
  const rows = [...new Map(products.map((product) => [product.name, product])).values()].sort(
    (a, b) => a.frequencyHz - b.frequencyHz,
  );
  const heads = [
    { text: 'product' },
    { text: 'frequency', isNumber: true },
    ...channels.map((channel) => ({ text: channelName(channel), isNumber: true })),
  ];
  return (
    <LineTable label="Table of products" heads={heads}>
      {rows.map(({ name, frequencyHz }) => (
        <tr key={name}>
          <th scope="row" className="bl-mono">
            {name}
          </th>
          <td className="bl-table-number bl-mono">{formatFrequency(frequencyHz, 1)}</td>
          {channels.map((channel) => {
            const own = products.find((one) => one.name === name && one.channel === channel);
            return (
              <td key={channel} className="bl-table-number">
                <LineLevel figureKey="levelDbr" value={own?.levelDbr ?? null} />
              </td>
            );
          })}
        </tr>
      ))}
    </LineTable>
  );
}
