import type { AxisModel } from './chart-model';
import { formatNumber } from '@/lib/format/number';
import { formatPlain } from '@/lib/format/quantity';

export interface Ticks {
  readonly major: readonly number[];
  readonly minor: readonly number[];
}

const STEPS = [1, 2, 5, 10] as const;
/** Minor divisions by the leading digit of the step: halves, halves, fifths. */
const MINOR_DIVISIONS: Record<number, number> = { 1: 2, 2: 2, 5: 5 };

function inRange(values: readonly number[], min: number, max: number): number[] {
  const slack = (max - min) * 1e-9;
  return values.filter((value) => value >= min - slack && value <= max + slack);
}

/** Multiples of a step, free of binary dust (0.30000000000000004). */
function multiples(step: number, min: number, max: number): number[] {
  const first = Math.ceil(min / step - 1e-9);
  const last = Math.floor(max / step + 1e-9);
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, index) => {
    const value = Number(((first + index) * step).toPrecision(12));
    return value === 0 ? 0 : value;
  });
}

/** The 1-2-5 step that gives as many majors as there is room for. */
function niceStep(range: number, mostTicks: number): { step: number; lead: number } {
  const raw = range / Math.max(1, mostTicks);
  const decade = 10 ** Math.floor(Math.log10(raw));
  const lead = STEPS.find((candidate) => candidate * decade >= raw * (1 - 1e-9)) ?? 10;
  return lead === 10 ? { step: 10 * decade, lead: 1 } : { step: lead * decade, lead };
}

function linearTicks(min: number, max: number, mostTicks: number): Ticks {
  const { step, lead } = niceStep(max - min, mostTicks);
  return {
    major: multiples(step, min, max),
    minor: multiples(step / (MINOR_DIVISIONS[lead] ?? 2), min, max),
  };
}

function fixedTicks(step: number, min: number, max: number, mostTicks: number): Ticks {
  let major = step;
  while ((max - min) / major > mostTicks) major *= 2;
  return { major: multiples(major, min, max), minor: multiples(step / 3, min, max) };
}

/** Minor at 1 to 9 of each decade, major at 1 2 5 where there is room, else at each decade. */
function logTicks(min: number, max: number, lengthPx: number, gapPx: number): Ticks {
  const minor: number[] = [];
  const major: number[] = [];
  const firstDecade = Math.floor(Math.log10(min));
  const pxPerDecade = lengthPx / Math.log10(max / min);
  const leads = pxPerDecade * Math.log10(2) >= gapPx ? [1, 2, 5] : [1];
  for (let exponent = firstDecade; 10 ** exponent <= max; exponent += 1) {
    const decade = 10 ** exponent;
    for (let lead = 1; lead < 10; lead += 1) minor.push(Number((lead * decade).toPrecision(12)));
    for (const lead of leads) major.push(Number((lead * decade).toPrecision(12)));
  }
  // With decades alone the axis still says where it starts.
  if (leads.length === 1 && !major.includes(min) && /^[125]0*$/.test(String(min))) major.unshift(min);
  return { major: inRange(major, min, max), minor: inRange(minor, min, max) };
}

/** Ticks of an axis of a given length; `gapPx` is the least distance between two labels. */
export function makeTicks(axis: AxisModel, min: number, max: number, lengthPx: number, gapPx: number): Ticks {
  const mostTicks = Math.max(2, Math.min(10, Math.floor(lengthPx / gapPx)));
  if (axis.scale === 'log') {
    const ticks = logTicks(min, max, lengthPx, gapPx);
    // Closer in than a decade or so a log axis is nearly straight: 1 2 5 would leave it bare.
    return ticks.major.length >= 3 ? ticks : linearTicks(min, max, mostTicks);
  }
  if (axis.tickStep && (max - min) / axis.tickStep >= 2)
    return fixedTicks(axis.tickStep, min, max, mostTicks);
  return linearTicks(min, max, mostTicks);
}

/** Digits after the point of the finest of these ticks: 0.5 beside 0 prints as 0.0. */
export function tickDecimals(values: readonly number[]): number {
  return Math.max(
    0,
    ...values.map((value) => String(Number(value.toPrecision(9))).split('.')[1]?.length ?? 0),
  );
}

/** 20 50 100 … 1k 2k: thousands of hertz by a k; signed scales print +. */
export function formatTick(axis: AxisModel, value: number, decimals = 0): string {
  if (axis.unit === 'Hz' && Math.abs(value) >= 1000)
    return `${axis.isSigned && value > 0 ? '+' : ''}${formatPlain(Number((value / 1000).toPrecision(6)))}k`;
  if (axis.isSigned && decimals > 0) return formatNumber(value, { decimals, isSigned: true });
  return (axis.isSigned && value > 0 ? '+' : '') + formatPlain(Number(value.toPrecision(9)));
}
