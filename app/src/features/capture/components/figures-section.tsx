import { Figure } from '@/components/figures/figure';
import { WorthKey } from '@/components/figures/worth-mark';
import { Section } from '@/components/page/page';
import { formatFigure } from '@/lib/format/figure';
import { channelName } from '@/lib/capture-words';
import { PHONE_QUERY, useMedia } from '@/lib/use-media';
import type { ServedBody } from '../api/record-queries';
import { buildFigureTable } from '../model/figure-table';
import type { FigureCell, FigureRow, FigureTable } from '../model/figure-table';

/** Figures of all channels in one table: unit, conditions, uncertainty and worth beside each. */
export function FiguresSection({ record }: { record: ServedBody }) {
  const table = buildFigureTable(record);
  const isPhone = useMedia(PHONE_QUERY);
  if (table.rows.length === 0) return null;
  return (
    <Section title="Figures" sub={isPhone ? undefined : '± is the expanded uncertainty, k = 2'}>
      <FigureTableView table={table} label="Table of figures" />
    </Section>
  );
}

const BETWEEN_TITLES: Partial<Record<ServedBody['measure'], string>> = {
  separation: 'Between the channels',
  loudness: 'The whole recording',
  programme: 'The whole recording',
};

/** Figures that belong to no one channel: separation, loudness, a programme's clock. */
export function BetweenSection({ record }: { record: ServedBody }) {
  const { settings, warnings, between, measure } = record;
  const one = { channel: 'between', figures: between.figures, limits: {}, uncertainty: {} };
  const table = buildFigureTable({ settings, warnings, channels: [one] });
  if (table.rows.length === 0) return null;
  const title = BETWEEN_TITLES[measure] ?? 'Between the channels';
  return (
    <Section title={title}>
      <FigureTableView table={table} label={`Figures: ${title.toLowerCase()}`} isWhole />
    </Section>
  );
}

interface FigureTableViewProps {
  table: FigureTable;
  label: string;
  /** One column, of no channel. */
  isWhole?: boolean;
}

function FigureTableView({ table, label, isWhole = false }: FigureTableViewProps) {
  const isPhone = useMedia(PHONE_QUERY);
  return (
    <>
      <div className="bl-table-scroll" tabIndex={0} role="region" aria-label={label}>
        <table className="bl-table bl-figure-table">
          <thead>
            <tr>
              <th scope="col">figure</th>
              {!isPhone && <th scope="col">unit</th>}
              {table.channels.map((channel) => (
                <th key={channel} scope="col" className="bl-figure-head">
                  {isWhole ? 'value' : channelName(channel)}
                </th>
              ))}
              {table.hasRig && !isPhone && (
                <th scope="col" className="bl-figure-head">
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
    </>
  );
}

/** The gap before ± is part of its width. */
const PLUS_MINUS_GAP_CH = 0.6;

/** A long fraction (a percentage) takes its room from the empty column of ±, so that the marks stay in theirs. */
function spareCh(row: FigureRow, cell: FigureCell, table: FigureTable): number {
  return Math.max(0, formatFigure(row.key, cell).fraction.length - table.fractionCh) * (14.5 / 12.5);
}

function FigureRowView({ row, table, isPhone }: { row: FigureRow; table: FigureTable; isPhone: boolean }) {
  return (
    <tr id={`figure-${row.key}`}>
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
        <td key={cell.channel}>
          {cell.value !== undefined && (
            <FigureCellView row={row} cell={cell} table={table} isPhone={isPhone} />
          )}
        </td>
      ))}
      {table.hasRig && !isPhone && (
        <td className="bl-figure-rig">
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

interface FigureCellProps {
  row: FigureRow;
  cell: FigureCell;
  table: FigureTable;
  isPhone: boolean;
}

/** On a phone the uncertainty stands under its value, so that two channels fit beside each other. */
function FigureCellView({ row, cell, table, isPhone }: FigureCellProps) {
  const { plusMinus, bound } = formatFigure(row.key, cell);
  return (
    <>
      <Figure
        figureKey={row.key}
        value={cell.value}
        limit={cell.limit}
        uncertainty={cell.uncertainty}
        integerCh={table.integerCh}
        fractionCh={table.fractionCh}
        uncertaintyCh={
          isPhone ? 0 : Math.max(0, table.uncertaintyCh + PLUS_MINUS_GAP_CH - spareCh(row, cell, table))
        }
        missingWhy={cell.missingWhy}
      />
      {isPhone && <span className="bl-figure-under">{bound ? 'bound' : plusMinus}</span>}
    </>
  );
}
