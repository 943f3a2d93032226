import type { BenchRecord, ChannelResult, FigureLimit, FigureUncertainty, FigureValue } from '@benchlark/dsp';
import { describeFigure, FIGURE_KEYS } from '@/lib/figures';
import { formatFigure } from '@/lib/format/figure';
import { worthOfFigure } from '@/lib/worth';
import type { Worth } from '@/lib/worth';

type Channel = Pick<ChannelResult, 'channel' | 'figures' | 'limits' | 'uncertainty'>;
type FigureRecord = Pick<BenchRecord, 'settings' | 'warnings'> & { readonly channels: readonly Channel[] };

export interface FigureCell {
  readonly channel: string;
  readonly value: FigureValue | undefined;
  readonly limit: FigureLimit | null;
  readonly uncertainty: FigureUncertainty | null;
  /** Why nothing stands here: the sentence of the warning that names the figure. */
  readonly missingWhy: string | null;
}

export interface FigureRow {
  readonly key: string;
  readonly label: string;
  readonly unit: string;
  readonly conditions: string | null;
  readonly cells: readonly FigureCell[];
  /** What the rig alone gives for it, where the record was made against a baseline. */
  readonly rig: { readonly value: number | null; readonly channel: string } | null;
}

export interface FigureTable {
  readonly channels: readonly string[];
  readonly rows: readonly FigureRow[];
  /** Characters before and after the point, over all cells: the points then stand under each other. */
  readonly integerCh: number;
  readonly fractionCh: number;
  readonly uncertaintyCh: number;
  readonly hasRig: boolean;
  readonly worths: readonly Worth[];
}

/** Two decimals: only percentages have more, and they would draw ± away from every other value. */
const MOST_FRACTION_CH = 3;

/** The record's figures as one table: a row each, a cell for each channel, in the catalogue's order. */
export function buildFigureTable(record: FigureRecord): FigureTable {
  const channels = record.channels.map(({ channel }) => channel);
  const rows = keysOf(record.channels).map((key) => buildRow(key, record));
  // A word (a polarity) stands where a number would and widens no column of numbers.
  const numbers = rows.flatMap(({ key, cells }) =>
    cells.filter(({ value }) => typeof value !== 'string').map((cell) => formatFigure(key, cell)),
  );
  const worths = rows.flatMap(({ key, cells }) =>
    cells.flatMap(({ value, limit }) => worthOfFigure(key, value, limit)?.worth ?? []),
  );
  const widest = (lengths: readonly number[]) => Math.max(0, ...lengths);
  return {
    channels,
    rows,
    integerCh: widest(numbers.map(({ integer, bound }) => integer.length + (bound ? 1 : 0))),
    fractionCh: Math.min(MOST_FRACTION_CH, widest(numbers.map(({ fraction }) => fraction.length))),
    // A percentage's long ± would push every other row's mark away from its value.
    uncertaintyCh: widest(
      numbers
        .filter(({ fraction }) => fraction.length <= MOST_FRACTION_CH)
        .map(({ plusMinus, bound }) => (bound ? 'bound'.length : (plusMinus?.length ?? 0))),
    ),
    hasRig: rows.some(({ rig }) => rig !== null),
    worths: [...new Set(worths)],
  };
}

function buildRow(key: string, record: FigureRecord): FigureRow {
  const { label, unit, conditions } = describeFigure(key);
  const fundamental = record.channels[0]?.figures['fundamentalFrequencyHz'];
  const cells = record.channels.map(({ channel, figures, limits, uncertainty }) => ({
    channel,
    value: figures[key],
    limit: limits[key] ?? null,
    uncertainty: uncertainty[key] ?? null,
    missingWhy: whyMissing(record, channel, key),
  }));
  return {
    key,
    label,
    unit,
    conditions: conditions({
      settings: record.settings,
      fundamentalFrequencyHz: typeof fundamental === 'number' ? fundamental : null,
    }),
    cells,
    rig: rigFigure(key, record, cells),
  };
}

/** The baseline's own figure; where only the floor is told, that one. */
function rigFigure(key: string, { settings }: FigureRecord, cells: readonly FigureCell[]): FigureRow['rig'] {
  const baseline = settings.baseline?.channels[0];
  if (!baseline) return null;
  const own = baseline.figures[key];
  if (typeof own === 'number') return { value: own, channel: baseline.channel };
  const floor = cells.find(({ limit }) => limit?.by === 'rig')?.limit?.floor ?? null;
  return { value: floor, channel: baseline.channel };
}

function whyMissing({ warnings }: FigureRecord, channel: string, key: string): string | null {
  const warning = warnings.find(
    (candidate) =>
      candidate.figures.includes(key) && (candidate.channel === null || candidate.channel === channel),
  );
  return warning?.message ?? null;
}

/** The catalogue's keys first, then what newer measures bring, in the record's order. */
function keysOf(channels: readonly Channel[]): readonly string[] {
  const present = new Set(channels.flatMap(({ figures }) => Object.keys(figures)));
  const known = FIGURE_KEYS.filter((key) => present.has(key));
  return [...known, ...[...present].filter((key) => !known.includes(key))];
}
