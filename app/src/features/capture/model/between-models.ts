import { evenRange, extentOf, stepRange } from '@/components/charts/axis-range';
import type { ChartModel, TraceModel } from '@/components/charts/chart-model';
import { formatLevel } from '@/lib/format/quantity';
import type { ServedBody } from '../api/record-queries';
import { tracesNamed } from './read-trace';
import type { ReadTrace } from './read-trace';
import { frequencyAxis } from './response-model';

/** The signal's own channel gives the slot: what leaks out of the left is drawn as the left is. */
const LEAKS = [
  { name: 'leftToRight', words: 'left into right', slot: 1 },
  { name: 'rightToLeft', words: 'right into left', slot: 2 },
] as const;

const BALANCE_NAME = 'right less left';

export const SEPARATION_TRACES: readonly string[] = ['leftToRight', 'rightToLeft', 'balance'];

function betweenTrace(traces: readonly ReadTrace[], name: string) {
  return tracesNamed(traces, name)[0]?.trace;
}

/** Separation and balance stand over each other: both have the frequencies that either has. */
function separationAxis(traces: readonly ReadTrace[]) {
  return frequencyAxis(traces.map(({ trace }) => trace.x));
}

/** How far one channel's signal stands over what of it is found in the other, both ways. */
export function separationModel(traces: readonly ReadTrace[]): ChartModel {
  const drawn = LEAKS.flatMap(({ name, words, slot }): TraceModel[] => {
    const trace = betweenTrace(traces, name);
    return trace && trace.x.length > 0
      ? [{ id: name, name: words, kind: 'curve', slot, x: trace.x, y: trace.y }]
      : [];
  });
  const { min, max } = stepRange(
    drawn.map(({ y }) => y),
    20,
  );
  return {
    x: separationAxis(traces),
    y: { quantity: 'Separation', unit: 'dB', scale: 'linear', min: Math.min(0, min), max },
    traces: drawn,
    labelRoom: [BALANCE_NAME],
  };
}

/** Right less left over frequency, on a scale of its own. */
export function balanceModel(traces: readonly ReadTrace[]): ChartModel {
  const trace = betweenTrace(traces, 'balance');
  return {
    x: separationAxis(traces),
    y: {
      quantity: 'Balance',
      unit: 'dB',
      scale: 'linear',
      ...evenRange(trace ? [trace.y] : [], 0.1),
      isSigned: true,
    },
    traces:
      trace && trace.x.length > 0
        ? [{ id: 'balance', name: BALANCE_NAME, kind: 'curve', slot: 1, x: trace.x, y: trace.y }]
        : [],
    hasZeroLine: true,
    labelRoom: LEAKS.map(({ words }) => words),
  };
}

/** Short-term loudness over time, the integrated one as a line through it. */
export function loudnessModel({ between }: ServedBody, traces: readonly ReadTrace[]): ChartModel {
  const trace = betweenTrace(traces, 'shortTerm');
  const drawn: TraceModel[] = trace
    ? [{ id: 'shortTerm', name: 'short-term', kind: 'curve', slot: 1, x: trace.x, y: trace.y }]
    : [];
  const times = extentOf(drawn.map(({ x }) => x)) ?? { min: 0, max: 1 };
  const integrated = between.figures['integratedLufs'];
  if (typeof integrated === 'number') {
    drawn.push({
      id: 'integrated',
      name: 'integrated',
      sub: formatLevel(integrated, 'LUFS'),
      kind: 'curve',
      slot: 5,
      x: [times.min, times.max],
      y: [integrated, integrated],
      isSecond: true,
    });
  }
  return {
    x: { quantity: 'Time', unit: 's', scale: 'linear', min: Math.min(0, times.min), max: times.max },
    y: {
      quantity: 'Loudness',
      unit: 'LUFS',
      scale: 'linear',
      ...stepRange(
        drawn.map(({ y }) => y),
        10,
      ),
    },
    traces: drawn,
  };
}

/** What stands between the tones of a multitone, over frequency. */
export function noiseAndDistortionModel(traces: readonly TraceModel[], unit: string): ChartModel {
  return {
    x: frequencyAxis(traces.map(({ x }) => x)),
    y: {
      quantity: 'Noise and distortion',
      unit,
      scale: 'linear',
      ...stepRange(
        traces.map(({ y }) => y),
        20,
      ),
    },
    traces,
  };
}
