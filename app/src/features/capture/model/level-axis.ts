import type { AxisModel } from '@/components/charts/chart-model';
import { airedRange, stepRange } from '@/components/charts/axis-range';
import type { ServedBody } from '../api/record-queries';
import { hasTrace } from './read-trace';
import type { ReadTrace } from './read-trace';

/** Whose level stands on the axis: the file's that was played, the recorder's, or the unit's own full scale. */
export type LevelAgainst = 'stimulus' | 'recorder' | 'unit';

const TEN_DB = 10;

const AXIS_NAMES: Record<LevelAgainst, Pick<AxisModel, 'quantity' | 'unit'>> = {
  stimulus: { quantity: 'Level of the stimulus', unit: 'dBFS' },
  recorder: { quantity: 'Level in the recording', unit: 'dBFS' },
  unit: { quantity: 'Level against the unit\u2019s full scale', unit: 'dB' },
};

/** What the axis can be read against, as far as the record says where the levels lie. */
export function levelChoices(body: ServedBody): LevelAgainst[] {
  const isUnitKnown = body.reference.unitFullScaleDbfs !== null;
  const choices: LevelAgainst[] = ['stimulus'];
  if (isUnitKnown || hasTrace(body, 'measuredLevel')) choices.push('recorder');
  if (isUnitKnown) choices.push('unit');
  return choices;
}

/**
 * A trace over the level of the stimulus, put over another level: by the level measured at that step, else by where
 * the unit's full scale lies. Steps whose place is not known are left out.
 */
export function relevel(
  { trace, channel }: ReadTrace,
  against: LevelAgainst,
  measured: readonly ReadTrace[],
  unitFullScaleDbfs: number | null,
): { x: Float64Array; y: Float64Array } {
  if (against === 'stimulus') return trace;
  const own = measured.find((one) => one.channel === channel)?.trace;
  const measuredAt = new Map(own ? Array.from(own.x, (x, index) => [x, own.y[index] ?? NaN]) : []);
  const fullScale = unitFullScaleDbfs ?? 0;
  const points = Array.from(trace.x, (x, index) => {
    const inRecording = own ? (measuredAt.get(x) ?? NaN) : x + fullScale;
    return [against === 'unit' ? inRecording - fullScale : inRecording, trace.y[index] ?? NaN] as const;
  }).filter(([x]) => Number.isFinite(x));
  points.sort(([a], [b]) => a - b);
  return { x: Float64Array.from(points, ([x]) => x), y: Float64Array.from(points, ([, y]) => y) };
}

/** An axis of levels that ends on tens, with air for the markers at its ends. */
export function levelAxis(against: LevelAgainst, lists: readonly ArrayLike<number>[]): AxisModel {
  const { min, max } = airedRange(stepRange(lists, TEN_DB));
  return { ...AXIS_NAMES[against], scale: 'linear', min, max };
}
