import { stepRange } from '@/components/charts/axis-range';
import { slotOf } from '@/components/charts/chart-model';
import type { ChartModel, TraceModel } from '@/components/charts/chart-model';
import { channelName } from '@/lib/capture-words';
import type { ServedBody } from '../api/record-queries';
import { levelAxis, relevel } from './level-axis';
import type { LevelAgainst } from './level-axis';
import { channelIndex, tracesNamed } from './read-trace';
import type { ReadTrace } from './read-trace';

/** Traces of two tones in steps, and how each is told from the other of its channel. */
const PRODUCTS = [
  { name: 'modulationDistortion', word: null },
  { name: 'differenceD2', word: '2nd order' },
  { name: 'differenceD3', word: '3rd order' },
] as const;

export const PAIR_STEP_TRACES: readonly string[] = PRODUCTS.map(({ name }) => name);

/** The products of two tones against the peak level at which they were played. */
export function pairStepsModel(
  body: ServedBody,
  traces: readonly ReadTrace[],
  against: LevelAgainst,
): ChartModel {
  const drawn = PRODUCTS.flatMap(({ name, word }, order) =>
    tracesNamed(traces, name).flatMap((one): TraceModel[] => {
      const { x, y } = relevel(one, against, [], body.reference.unitFullScaleDbfs);
      if (x.length === 0) return [];
      const own = channelName(one.channel);
      // 2nd order takes the first slots, 3rd order the next: shape and dash tell them apart.
      const slot = slotOf(channelIndex(body, one.channel) + (order === 2 ? body.channels.length : 0));
      return [
        { id: `${one.channel}-${name}`, name: word ? `${own}, ${word}` : own, kind: 'curve', slot, x, y },
      ];
    }),
  );
  return {
    x: levelAxis(
      against,
      drawn.map(({ x }) => x),
    ),
    y: {
      quantity: 'Products',
      unit: 'dB',
      scale: 'linear',
      ...stepRange(
        drawn.map(({ y }) => y),
        20,
      ),
    },
    traces: drawn,
  };
}
