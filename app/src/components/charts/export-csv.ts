import type { ChartModel, TraceModel } from './chart-model';
import { captionLines, type ChartToExport } from './export-chart';
import { axisName } from './draw-frame';

/** Rows written before the page is given time to breathe. */
const ROWS_AT_ONCE = 20_000;

/** A text cell that no spreadsheet takes for a formula, quoted where the format asks for it (RFC 4180). */
export function csvCell(text: string): string {
  const harmless = /^[=+\-@\t\r]/.test(text) ? `'${text}` : text;
  return /[",\r\n]/.test(harmless) ? `"${harmless.replace(/"/g, '""')}"` : harmless;
}

function sharesX(a: TraceModel, b: TraceModel): boolean {
  return (
    a.x === b.x ||
    (a.x.length === b.x.length && Array.prototype.every.call(a.x, (value, index) => value === b.x[index]))
  );
}

interface Column {
  readonly head: string;
  readonly values: ArrayLike<number>;
}

/** One x column for traces that share it, else a pair of columns each. */
export function csvColumns(model: ChartModel, traces: readonly TraceModel[]): Column[] {
  const columns: Column[] = [];
  let shared: TraceModel | null = null;
  for (const trace of traces) {
    if (!shared || !sharesX(shared, trace)) columns.push({ head: axisName(model.x), values: trace.x });
    shared = trace;
    const unit = trace.unit ?? model.y.unit;
    columns.push({
      head: axisName({ quantity: `${trace.name}, ${model.y.quantity.toLowerCase()}`, unit }),
      values: trace.y,
    });
  }
  return columns;
}

function csvNumber(value: number | undefined): string {
  return value === undefined || Number.isNaN(value) ? '' : String(Number(value.toPrecision(9)));
}

/** Every point of the shown traces, not the drawn ones; a table that any spreadsheet opens. */
export async function exportCsv(chart: ChartToExport): Promise<Blob> {
  const { model, hiddenIds } = chart;
  const columns = csvColumns(
    model,
    model.traces.filter(({ id }) => !hiddenIds.has(id)),
  );
  const head = captionLines(chart).map((line) => `${csvCell(line)}\r\n`);
  const parts: string[] = [...head, `${columns.map((column) => csvCell(column.head)).join(',')}\r\n`];
  const rowCount = Math.max(0, ...columns.map(({ values }) => values.length));
  for (let from = 0; from < rowCount; from += ROWS_AT_ONCE) {
    const rows: string[] = [];
    for (let row = from; row < Math.min(rowCount, from + ROWS_AT_ONCE); row += 1) {
      rows.push(columns.map(({ values }) => csvNumber(values[row])).join(','));
    }
    parts.push(`${rows.join('\r\n')}\r\n`);
    await new Promise((resolve) => setTimeout(resolve));
  }
  // The mark of byte order makes spreadsheets read µ and ° right.
  return new Blob(['\ufeff', ...parts], { type: 'text/csv;charset=utf-8' });
}
