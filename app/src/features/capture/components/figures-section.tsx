import { Figure } from '@/components/figures/figure';
import { WorthKey } from '@/components/figures/worth-mark';
import { Section } from '@/components/page/page';
import { channelName } from '@/lib/capture-words';
import { PHONE_QUERY, useMedia } from '@/lib/use-media';
import type { ServedRecord } from '../api/record-queries';
import { buildFigureTable } from '../model/figure-table';
import type { FigureRow, FigureTable } from '../model/figure-table';

/** Figures of all channels in one table: unit, conditions, uncertainty and worth beside each. */
export function FiguresSection({ record }: { record: ServedRecord }) {
  const table = buildFigureTable(record);
  const isPhone = useMedia(PHONE_QUERY);
  return (
    <Section title="Figures" sub={isPhone ? undefined : '± is the expanded uncertainty, k = 2'}>
      <div className="bl-table-scroll" tabIndex={0} role="region" aria-label="Figures">
        <table className="bl-table bl-figure-table">
          <thead>
            <tr>
              <th scope="col">figure</th>
              {!isPhone && <th scope="col">unit</th>}
              {table.channels.map((channel) => (
                <th key={channel} scope="col" className="bl-table-number">
                  {channelName(channel)}
                </th>
              ))}
              {table.hasRig && !isPhone && (
                <th scope="col" className="bl-table-number">
                  rig alone
                </th>
              )}
            </tr>
          </thead>
          <tbody>
            {table.rows.map((row) => (
              <FigureRowView key={row.key} row={row} table={table} isPhone={isPhone} />
            ))}
          </tbody>
        </table>
      </div>
      <WorthKey worths={table.worths} />
    </Section>
  );
}

function FigureRowView({ row, table, isPhone }: { row: FigureRow; table: FigureTable; isPhone: boolean }) {
  return (
    <tr>
      <th scope="row">
        {row.label}{' '}
        {isPhone ? (
          <span className="bl-table-second">{[row.unit, row.conditions].filter(Boolean).join(', ')}</span>
        ) : (
          row.conditions && <span className="bl-figure-conditions">{row.conditions}</span>
        )}
      </th>
      {!isPhone && <td className="bl-ink-2">{row.unit}</td>}
      {row.cells.map((cell) => (
        <td key={cell.channel} className="bl-table-number">
          {cell.value !== undefined && (
            <Figure
              figureKey={row.key}
              value={cell.value}
              limit={cell.limit}
              uncertainty={cell.uncertainty}
              integerCh={table.integerCh}
              fractionCh={table.fractionCh}
              uncertaintyCh={table.uncertaintyCh}
              missingWhy={cell.missingWhy}
            />
          )}
        </td>
      ))}
      {table.hasRig && !isPhone && (
        <td className="bl-table-number bl-figure-rig">
          {row.rig && row.rig.value !== null && (
            <Figure
              figureKey={row.key}
              value={row.rig.value}
              integerCh={table.integerCh}
              fractionCh={table.fractionCh}
              uncertaintyCh={0}
              hasWorth={false}
            />
          )}
        </td>
      )}
    </tr>
  );
}
