import { airedRange, evenRange, extentOf, stepRange } from '@/components/charts/axis-range';
import { slotOf } from '@/components/charts/chart-model';
import type { ChartModel, ChartNote, Inset, TraceModel } from '@/components/charts/chart-model';
import { channelName } from '@/lib/capture-words';
import { formatNumber } from '@/lib/format/number';
import { withUnit } from '@/lib/format/quantity';
import type { ServedBody } from '../api/record-queries';
import { levelAxis, relevel } from './level-axis';
import type { LevelAgainst } from './level-axis';
import { channelIndex, tracesNamed } from './read-trace';
import type { ReadTrace } from './read-trace';

/** As `linearDownToDbfs` has it: within half a decibel a step still follows. */
export const LINEAR_WITHIN_DB = 0.5;
/** Deviation is drawn over the levels that music has; further down it is the noise's own. */
const DRAWN_DOWN_DB = 90;
const LEAST_DEVIATION_SHOWN_DB = 0.7;
/** Smaller than this needs no words in the chart. */
const WORTH_A_NOTE_DB = 0.1;
const INSET_DB = 12;
const RATIO_STEP_DB = 20;

export interface LevelStepsParts {
  readonly body: ServedBody;
  readonly traces: readonly ReadTrace[];
  readonly against: LevelAgainst;
}

interface Wanted {
  readonly name: string;
  /** After the channel's name: "left, THD". */
  readonly word?: string;
  readonly isSecond?: boolean;
}

function curves({ body, traces, against }: LevelStepsParts, wanted: readonly Wanted[]): TraceModel[] {
  const measured = tracesNamed(traces, 'measuredLevel');
  return wanted.flatMap(({ name, word, isSecond = false }) =>
    tracesNamed(traces, name).flatMap((one): TraceModel[] => {
      const { x, y } = relevel(one, against, measured, body.reference.unitFullScaleDbfs);
      if (x.length === 0) return [];
      const own = channelName(one.channel);
      return [
        {
          id: `${one.channel}-${name}`,
          name: word ? `${own}, ${word}` : own,
          kind: 'curve',
          slot: slotOf(channelIndex(body, one.channel)),
          x,
          y,
          isSecond,
        },
      ];
    }),
  );
}

/** The axis of both charts over the level: they stand on one left edge. */
function sharedAxis(parts: LevelStepsParts) {
  const all = curves(parts, [{ name: 'deviation' }, { name: 'thdPlusNoise' }]);
  return levelAxis(
    parts.against,
    all.map(({ x }) => x),
  );
}

/** How far each step strays from what the -20 dBFS step promises, between the walls of "still linear". */
export function deviationModel(parts: LevelStepsParts): ChartModel {
  const x = sharedAxis(parts);
  const traces = curves(parts, [{ name: 'deviation' }]);
  const heard = traces.map((trace) =>
    Array.from(trace.y).filter((_, index) => (trace.x[index] ?? -Infinity) >= x.max - DRAWN_DOWN_DB),
  );
  const words = `still linear: within \u00b1${formatNumber(LINEAR_WITHIN_DB, { decimals: 1 })} dB`;
  return {
    x,
    y: {
      quantity: 'Deviation from linear',
      unit: 'dB',
      scale: 'linear',
      ...evenRange(heard, LEAST_DEVIATION_SHOWN_DB),
      isSigned: true,
    },
    traces,
    walls: [
      { side: 'above', x: [x.min, x.max], y: [LINEAR_WITHIN_DB, LINEAR_WITHIN_DB], words },
      { side: 'below', x: [x.min, x.max], y: [-LINEAR_WITHIN_DB, -LINEAR_WITHIN_DB], words: '' },
    ],
    hasZeroLine: true,
    labelRoom: labelRoom(parts.body),
    notes: deviationNotes(traces),
  };
}

/** The longest name that either chart may carry. */
function labelRoom({ channels }: ServedBody): string[] {
  return channels.map(({ channel }) => `${channelName(channel)}, residual`);
}

/** The top step's deviation in words, of the channel in which it is greatest. */
function deviationNotes(traces: readonly TraceModel[]): ChartNote[] {
  const tops = traces.map(({ x, y, name }) => ({
    name,
    x: x[x.length - 1] ?? NaN,
    y: y[y.length - 1] ?? NaN,
  }));
  tops.sort((a, b) => Math.abs(b.y) - Math.abs(a.y));
  const [top] = tops;
  if (!top || !(Math.abs(top.y) >= WORTH_A_NOTE_DB)) return [];
  const size = withUnit(formatNumber(top.y, { decimals: 2, isSigned: true }), 'dB');
  return [{ x: top.x, y: top.y, lines: [`${size} at the top step, ${top.name}`] }];
}

/** What is added on the way: against the tone, or as a level of its own. */
export type AddedAs = 'ratio' | 'level';

const ADDED: Record<AddedAs, { wanted: readonly Wanted[]; quantity: string; unit: string }> = {
  ratio: {
    wanted: [
      { name: 'thdPlusNoise', word: 'THD+N' },
      { name: 'thd', word: 'THD', isSecond: true },
    ],
    quantity: 'THD and THD+N',
    unit: 'dB',
  },
  level: {
    wanted: [
      { name: 'residual', word: 'residual' },
      { name: 'noise', word: 'noise', isSecond: true },
    ],
    quantity: 'Residual and noise',
    unit: 'dBFS',
  },
};

export function addedModel(parts: LevelStepsParts, as: AddedAs): ChartModel {
  const { wanted, quantity, unit } = ADDED[as];
  const traces = curves(parts, wanted);
  const inset = topInset(traces);
  const range = stepRange(
    traces.map(({ y }) => y),
    RATIO_STEP_DB,
  );
  // One step more at the foot keeps a corner free for the inset.
  const min = inset ? range.min - RATIO_STEP_DB : range.min;
  return {
    x: sharedAxis(parts),
    y: { quantity, unit, scale: 'linear', min, max: range.max },
    traces,
    labelRoom: labelRoom(parts.body),
    inset,
  };
}

/** The top 12 dB, where a limit shows first. */
function topInset(traces: readonly TraceModel[]): Inset | undefined {
  const top = extentOf(traces.map(({ x }) => x))?.max;
  if (top === undefined) return undefined;
  const inside = traces.map(({ x, y }) =>
    Array.from(y).filter((_, index) => (x[index] ?? -Infinity) >= top - INSET_DB - 1e-9),
  );
  if (inside.every((points) => points.length < 3)) return undefined;
  const xs = airedRange({ min: top - INSET_DB, max: top }, 0.04);
  const ys = stepRange(inside, RATIO_STEP_DB);
  return {
    title: `the top ${INSET_DB} dB`,
    view: { xMin: xs.min, xMax: xs.max, yMin: ys.min, yMax: ys.max },
  };
}

const REFERENCE_DBFS = -20;

/** Output against input on equal axes: a decibel more in should give a decibel more out. */
export function transferModel({ body, traces }: Omit<LevelStepsParts, 'against'>): ChartModel {
  const drawn = curves({ body, traces, against: 'stimulus' }, [{ name: 'measuredLevel' }]);
  const { min, max, quantity, unit } = levelAxis(
    'stimulus',
    drawn.map(({ x }) => x),
  );
  const gainDb = body.reference.unitFullScaleDbfs ?? gainAtReference(drawn);
  const one: TraceModel = {
    id: 'one-for-one',
    name: '1 dB for 1 dB',
    kind: 'wave',
    slot: 5,
    x: [min, max],
    y: [min + gainDb, max + gainDb],
  };
  return {
    x: { quantity, unit, scale: 'linear', min, max },
    y: {
      quantity: 'Level in the recording',
      unit: 'dBFS',
      scale: 'linear',
      min: min + gainDb,
      max: max + gainDb,
    },
    traces: [...drawn, one],
    isSquare: true,
  };
}

/** What the chain gives at the step nearest to -20 dBFS, dB. */
function gainAtReference(traces: readonly TraceModel[]): number {
  const [first] = traces;
  if (!first) return 0;
  let best = 0;
  for (let index = 1; index < first.x.length; index += 1) {
    const distance = (at: number) => Math.abs((first.x[at] ?? Infinity) - REFERENCE_DBFS);
    if (distance(index) < distance(best)) best = index;
  }
  return (first.y[best] ?? 0) - (first.x[best] ?? 0);
}
