import { useTable } from '@tanstack/react-table';
import type { SortingState } from '@tanstack/react-table';
import { useMemo, useRef } from 'react';
import type { Capture } from '@/lib/api-schema';
import { dayParts } from '@/lib/format/date';
import { archiveColumns, archiveFeatures } from '../model/archive-columns';
import { SORT_COLUMNS } from '../model/archive-filter';
import type { ArchiveFilter, SortColumn } from '../model/archive-filter';
import { daysOf, spanTo } from '../model/chosen-rows';

export interface ArchiveTableProps {
  captures: readonly Capture[];
  filter: ArchiveFilter;
  chosen: ReadonlySet<number>;
  canChoose: boolean;
  onSort: (sort: SortColumn, order: ArchiveFilter['order']) => void;
  onChoose: (chosen: ReadonlySet<number>) => void;
}

/** The captures by day, each with a drawing of its trace. */
export function ArchiveTable({ captures, filter, chosen, canChoose, onSort, onChoose }: ArchiveTableProps) {
  const lastChosen = useRef<number | null>(null);
  const data = useMemo(() => [...captures], [captures]);
  const sorting = useMemo<SortingState>(
    () => [{ id: filter.sort, desc: filter.order === 'desc' }],
    [filter.sort, filter.order],
  );
  const rowSelection = useMemo(
    () => Object.fromEntries([...chosen].map((number) => [String(number), true as const])),
    [chosen],
  );
  const table = useTable({
    features: archiveFeatures,
    columns: archiveColumns,
    data,
    getRowId: ({ number }) => String(number),
    manualSorting: true,
    state: { sorting, rowSelection },
  });
  const choose = (number: number, isChosen: boolean, isSpan: boolean) => {
    const numbers = captures.map((capture) => capture.number);
    const touched = isSpan ? spanTo(numbers, lastChosen.current, number) : [number];
    lastChosen.current = number;
    const next = new Set(chosen);
    for (const one of touched) {
      if (isChosen) next.add(one);
      else next.delete(one);
    }
    onChoose(next);
  };
  const rows = table.getRowModel().rows;
  const isByDay = filter.sort === 'uploadedAt' || filter.sort === 'number';
  const days = isByDay ? daysOf(captures) : [];
  return (
    <div className="bl-table-scroll" tabIndex={0} role="region" aria-label="Table of captures">
      <table className="bl-table bl-table-rows bl-archive-table">
        <thead>
          {table.getHeaderGroups().map((group) => (
            <tr key={group.id}>
              <th scope="col" aria-sort={ariaSort(filter, 'uploadedAt')}>
                <SortButton label="day" column="uploadedAt" filter={filter} onSort={onSort} />
              </th>
              {canChoose && (
                <th scope="col">
                  <span className="bl-hidden">chosen</span>
                </th>
              )}
              {group.headers.map((header) => {
                const sortable = SORT_COLUMNS.find((id) => id === header.column.id);
                return (
                  <th
                    key={header.id}
                    scope="col"
                    aria-sort={sortable ? ariaSort(filter, sortable) : undefined}
                  >
                    {sortable ? (
                      <SortButton
                        label={String(header.column.columnDef.header)}
                        column={sortable}
                        filter={filter}
                        onSort={onSort}
                      />
                    ) : (
                      <table.FlexRender header={header} />
                    )}
                  </th>
                );
              })}
            </tr>
          ))}
        </thead>
        <tbody>
          {rows.map((row, index) => {
            const { original } = row;
            const span = days[index];
            return (
              <tr key={row.id} data-chosen={row.getIsSelected()}>
                {isByDay ? (
                  span !== undefined && span > 0 && <DayCell moment={original.uploadedAt} rowSpan={span} />
                ) : (
                  <DayCell moment={original.uploadedAt} rowSpan={1} />
                )}
                {canChoose && (
                  <td className="bl-archive-choose">
                    <label>
                      <input
                        type="checkbox"
                        aria-label={`Choose capture ${original.number}`}
                        checked={row.getIsSelected()}
                        onChange={(event) =>
                          choose(
                            original.number,
                            event.target.checked,
                            event.nativeEvent instanceof MouseEvent && event.nativeEvent.shiftKey,
                          )
                        }
                      />
                    </label>
                  </td>
                )}
                {row.getAllCells().map((cell) => (
                  <td key={cell.id} className={`bl-archive-${cell.column.id}`}>
                    <table.FlexRender cell={cell} />
                  </td>
                ))}
              </tr>
            );
          })}
        </tbody>
      </table>
    </div>
  );
}

function DayCell({ moment, rowSpan }: { moment: string; rowSpan: number }) {
  const { day, month, year } = dayParts(moment);
  return (
    <th scope="rowgroup" rowSpan={rowSpan} className="bl-archive-day">
      <strong>{day}</strong> <span>{month}</span>
      <span className="bl-hidden"> {year}</span>
    </th>
  );
}

interface SortButtonProps {
  label: string;
  column: SortColumn;
  filter: ArchiveFilter;
  onSort: ArchiveTableProps['onSort'];
}

/** The first press sorts the way one mostly wants it, the next turns it round. */
function SortButton({ label, column, filter, onSort }: SortButtonProps) {
  const isSorted = filter.sort === column;
  const first = column === 'uploadedAt' || column === 'number' ? 'desc' : 'asc';
  const next = isSorted ? (filter.order === 'asc' ? 'desc' : 'asc') : first;
  return (
    <button type="button" className="bl-table-sort" onClick={() => onSort(column, next)}>
      {label}
      {isSorted && (
        <svg width="9" height="6" viewBox="0 0 9 6" aria-hidden="true" className="bl-archive-arrow">
          <path
            d={filter.order === 'asc' ? 'M1 5l3.5-3.5L8 5' : 'M1 1l3.5 3.5L8 1'}
            fill="none"
            stroke="currentColor"
            strokeWidth="1.3"
          />
        </svg>
      )}
    </button>
  );
}

function ariaSort(filter: ArchiveFilter, column: SortColumn): 'ascending' | 'descending' | undefined {
  if (filter.sort !== column) return undefined;
  return filter.order === 'asc' ? 'ascending' : 'descending';
}
