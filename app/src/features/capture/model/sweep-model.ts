import { evenRange, extentOf, stepRange } from '@/components/charts/axis-range';
import type { ChartModel, Slot, TraceModel } from '@/components/charts/chart-model';
import { formatOrdinal } from '@/lib/format/quantity';
import type { ServedBody } from '../api/record-queries';
import { octaveMean } from './octave-mean';
import { tracesNamed } from './read-trace';
import type { ReadTrace } from './read-trace';
import { channelCurves, frequencyAxis } from './response-model';

/** Phase with the delay taken out, over frequency. */
export function phaseModel(body: ServedBody, traces: readonly ReadTrace[]): ChartModel {
  const drawn = channelCurves({ body, traces, name: 'phase' });
  return {
    x: frequencyAxis(drawn.map(({ x }) => x)),
    y: {
      quantity: 'Phase',
      unit: 'degrees',
      scale: 'linear',
      ...evenRange(
        drawn.map(({ y }) => y),
        90,
      ),
      isSigned: true,
      tickStep: 45,
    },
    traces: drawn,
    hasZeroLine: true,
  };
}

const MS_PER_S = 1000;

/** The impulse about its arrival, in milliseconds and in parts of its own peak. */
export function impulseModel(body: ServedBody, traces: readonly ReadTrace[]): ChartModel {
  const drawn = channelCurves({ body, traces, name: 'impulse' }).map((trace) => ({
    ...trace,
    x: Float64Array.from(trace.x, (seconds) => seconds * MS_PER_S),
  }));
  const { min, max } = extentOf(drawn.map(({ x }) => x)) ?? { min: -2, max: 10 };
  return {
    x: { quantity: 'Time from the arrival', unit: 'ms', scale: 'linear', min, max, isSigned: true },
    y: {
      quantity: 'Impulse, parts of its peak',
      unit: '',
      scale: 'linear',
      min: -1.1,
      max: 1.1,
      isSigned: true,
    },
    traces: drawn,
    hasZeroLine: true,
  };
}

/** Right is vermillion everywhere on a two-channel record: the orders of one channel pass it over. */
const ORDER_SLOTS: Readonly<Record<number, Slot>> = { 2: 1, 3: 3, 4: 4, 5: 5 };
export const HARMONIC_TRACES: readonly string[] = Object.keys(ORDER_SLOTS).map((order) => `harmonic${order}`);

/** Harmonics 2 to 5 of one channel over the frequency of the tone that makes them, in means of a twelfth of an octave. */
export function harmonicsModel(traces: readonly ReadTrace[], channel: string): ChartModel {
  const drawn = Object.entries(ORDER_SLOTS).flatMap(([order, slot]): TraceModel[] => {
    const found = tracesNamed(traces, `harmonic${order}`).find((one) => one.channel === channel)?.trace;
    if (!found || found.x.length === 0) return [];
    const name = `${formatOrdinal(Number(order))} harmonic`;
    const mean = octaveMean(found.x, found.y);
    return [{ id: `harmonic${order}`, name, kind: 'curve', slot, ...mean }];
  });
  return {
    x: { ...frequencyAxis(drawn.map(({ x }) => x)), quantity: 'Frequency of the tone' },
    y: {
      quantity: 'Harmonics',
      unit: 'dBr',
      scale: 'linear',
      ...stepRange(
        drawn.map(({ y }) => y),
        20,
      ),
    },
    traces: drawn,
  };
}
