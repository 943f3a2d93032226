import { decimalsForStep } from '@/lib/format/digits';
import { formatNumber } from '@/lib/format/number';
import { formatFrequency, withUnit } from '@/lib/format/quantity';
import type { AxisModel, ChartModel, TraceModel } from './chart-model';

function place(axis: AxisModel, x: number): string {
  if (axis.unit === 'Hz' && !axis.isSigned) return formatFrequency(Number(x.toPrecision(4)));
  const decimals = decimalsForStep((axis.max - axis.min) / 1000);
  return withUnit(formatNumber(x, { decimals, isSigned: axis.isSigned ?? false }), axis.unit);
}

function value({ y }: ChartModel, trace: TraceModel, number: number): string {
  const decimals = decimalsForStep((y.max - y.min) / 1000);
  return withUnit(formatNumber(number, { decimals, isSigned: y.isSigned ?? false }), trace.unit ?? y.unit);
}

function sentence(model: ChartModel, trace: TraceModel): string {
  let [least, greatest] = [-1, -1];
  for (let index = 0; index < trace.x.length; index += 1) {
    const x = trace.x[index] ?? NaN;
    const y = trace.y[index] ?? NaN;
    if (x < model.x.min || x > model.x.max || !Number.isFinite(y)) continue;
    if (least < 0 || y < (trace.y[least] ?? NaN)) least = index;
    if (greatest < 0 || y > (trace.y[greatest] ?? NaN)) greatest = index;
  }
  if (least < 0) return `${trace.name}: no points.`;
  const at = (index: number) =>
    `${value(model, trace, trace.y[index] ?? NaN)} at ${place(model.x, trace.x[index] ?? NaN)}`;
  if (trace.y[least] === trace.y[greatest])
    return `${trace.name}: ${value(model, trace, trace.y[least] ?? NaN)} throughout.`;
  return `${trace.name}: greatest ${at(greatest)}, least ${at(least)}.`;
}

/** A curve chart in a few sentences: what over what, and where each curve is greatest and least. */
export function curvesInWords(model: ChartModel): string {
  const { x, y, traces } = model;
  const range = `${y.quantity} in ${y.unit} over ${x.quantity.toLowerCase()} from ${place(x, x.min)} to ${place(x, x.max)}.`;
  const curves = traces.filter(({ kind }) => kind !== 'wave' && kind !== 'floor');
  return [range, ...curves.map((trace) => sentence(model, trace))].join(' ');
}
