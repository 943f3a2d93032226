import { decimalsForStep } from '@/lib/format/digits';
import { formatNumber, THIN_SPACE } from '@/lib/format/number';
import { formatCount, formatOrdinal, withUnit } from '@/lib/format/quantity';
import type { AxisModel, TraceModel } from './chart-model';
import { lowerBound } from './decimate';
import type { ChartScene, DrawnTrace } from './draw-context';

export interface ReadoutRow {
  readonly trace: TraceModel;
  readonly x: number;
  readonly y: number;
  readonly number: string;
  readonly unit: string;
  /** Bins behind the point; more than one means their power mean. */
  readonly count: number;
}

export interface Readout {
  readonly x: number;
  readonly title: string;
  readonly rows: readonly ReadoutRow[];
  /** "up to 23 bins averaged", where a pixel holds more than one (their power mean; lines keep their height). */
  readonly footnote: string | null;
  readonly spoken: string;
}

/** Index of the drawn point nearest to x. */
export function nearestPoint({ points }: DrawnTrace, x: number): number {
  const after = Math.min(points.x.length - 1, lowerBound(points.x, x));
  const before = Math.max(0, after - 1);
  const isBefore = Math.abs((points.x[before] ?? NaN) - x) <= Math.abs((points.x[after] ?? NaN) - x);
  return isBefore ? before : after;
}

/** The trace whose points the cursor steps through: the first one shown. */
export function steppedTrace(scene: ChartScene): DrawnTrace | undefined {
  return scene.drawn.find(({ trace, points }) => trace.kind !== 'wave' && points.x.length > 0);
}

function formatX(axis: AxisModel, x: number, step: number): string {
  return withUnit(formatNumber(x, { decimals: decimalsForStep(step) }), axis.unit);
}

function isDecibels(unit: string): boolean {
  return unit.startsWith('dB') || unit.startsWith('LU');
}

/** dB to a tenth, finer on a scale of a few dB; other units to a thousandth of the scale. */
function formatY(axis: AxisModel, y: number): string {
  const range = axis.max - axis.min;
  const decimals = isDecibels(axis.unit)
    ? range <= 1
      ? 3
      : range <= 12
        ? 2
        : 1
    : decimalsForStep(range / 1000);
  return formatNumber(y, { decimals, isSigned: axis.isSigned ?? false });
}

/** The step between points about a place: a log-spaced curve needs fewer digits the higher it reads. */
function stepAt({ x }: TraceModel, at: number): number {
  const index = Math.min(x.length - 1, Math.max(1, lowerBound(x, at)));
  return Math.abs((x[index] ?? 1) - (x[index - 1] ?? 0));
}

/** The harmonic or product whose place this is, within a pixel or two. */
function markAt({ model, scales }: ChartScene, x: number): string | null {
  const px = scales.x.toPx(x);
  const mark = (model.harmonics ?? []).find((candidate) => Math.abs(scales.x.toPx(candidate.x) - px) < 1.6);
  if (!mark) return null;
  if (mark.name) return mark.name;
  return mark.order === 1 ? 'fundamental' : `${formatOrdinal(mark.order)} harmonic`;
}

/** What the cursor reads at x: the drawn point nearest to it of each shown trace. */
export function readAt(scene: ChartScene, x: number): Readout | null {
  const stepped = steppedTrace(scene);
  if (!stepped) return null;
  const index = nearestPoint(stepped, x);
  const atX = stepped.points.x[index] ?? x;
  const rows = scene.drawn.flatMap((drawn): ReadoutRow[] => {
    const at = drawn === stepped ? index : nearestPoint(drawn, atX);
    const y = drawn.points.y[at] ?? NaN;
    if (Number.isNaN(y)) return [];
    const unit = drawn.trace.unit ?? scene.model.y.unit;
    const number = formatY(scene.model.y, y);
    return [
      {
        trace: drawn.trace,
        x: drawn.points.x[at] ?? atX,
        y,
        number,
        unit,
        count: drawn.points.count[at] ?? 1,
      },
    ];
  });
  const mark = markAt(scene, atX);
  const place = formatX(scene.model.x, atX, stepAt(stepped.trace, atX));
  const title = capitalise(mark === null ? place : `${mark}, ${place}`);
  const count = Math.max(1, ...rows.map((row) => row.count));
  const values = rows.map((row) => `${row.trace.name} ${withUnit(row.number, row.unit)}`);
  return {
    x: atX,
    title,
    rows,
    footnote: count > 1 ? `up to ${formatCount(count)} bins averaged` : null,
    spoken: `${title}: ${values.join(', ')}`.replaceAll(THIN_SPACE, ''),
  };
}

function capitalise(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
