import { type BenchRecord, type ChannelResult, type RecordBody, type Trace } from '@benchlark/dsp';
import type { MainFigure } from '../records/record.entity';
import type { RecordFigure } from '../records/record-figure.entity';
import { unitWord } from '../records/unit-word';

export const SKETCH_POINTS = 64;
const SKETCH_FLOOR_DB = -160;

/** The figure that says most about each measure's record, first found first. */
const MAIN_KEYS: Readonly<Record<string, readonly string[]>> = {
  tone: ['thdPlusNoiseDb', 'thdDb', 'noiseDbfs'],
  idle: ['noiseAWeightedDbfs', 'noiseDbfs'],
  'dynamic-range': ['dynamicRangeAWeightedDb', 'dynamicRangeDb'],
  'two-tone': ['modulationDistortionDb', 'differenceDistortionDb'],
  'level-steps': ['linearDownToDbfs', 'maxDeviationDb'],
  sweep: ['flatnessDb'],
  multitone: ['noiseAndDistortionDb', 'flatnessDb'],
  separation: ['separationLeftToRightAt1kHzDb'],
  jitter: ['jitterRmsPs', 'jitterPeakToPeakPs'],
  intersample: ['levelErrorDb', 'thdDb'],
  filter: ['passBandRippleDb', 'minus3DbHighHz'],
  loudness: ['integratedLufs'],
  programme: ['clockOffsetPpm'],
};
/** Of these the smaller value is the worse channel's. */
const SMALLER_IS_WORSE = /^(dynamicRange|separation|snr|sinad|enob|minus3DbHigh)/;

type Place = Pick<ChannelResult, 'channel' | 'figures'> & Partial<ChannelResult>;

function placesOf(body: RecordBody): Place[] {
  return [...body.channels, { channel: 'between', figures: body.between.figures }];
}

/** The figure a list shows: of the channel in which it is worst. */
export function mainFigureOf(body: RecordBody): MainFigure | null {
  for (const key of MAIN_KEYS[body.measure] ?? []) {
    const found = placesOf(body).flatMap(({ channel, figures, limits }) => {
      const value = figures[key];
      return typeof value === 'number' ? [{ channel, value, limit: limits?.[key] }] : [];
    });
    const sign = SMALLER_IS_WORSE.test(key) ? -1 : 1;
    found.sort((one, other) => sign * (other.value - one.value));
    const [worst] = found;
    if (!worst) continue;
    return {
      key,
      value: worst.value,
      unit: unitWord(key),
      channel: worst.channel,
      limitBy: worst.limit?.by ?? null,
      marginDb: worst.limit?.marginDb ?? null,
    };
  }
  return null;
}

/** Every figure as a row; segment 0 is the record itself. */
export function figureRows(recordId: string, record: BenchRecord): Omit<RecordFigure, 'record'>[] {
  return [record, ...record.segments].flatMap((body, segment) =>
    placesOf(body).flatMap(({ channel, figures, limits, uncertainty }) =>
      Object.entries(figures).map(([key, value]) => ({
        recordId,
        segment,
        channel,
        key,
        value: typeof value === 'number' ? value : null,
        word: typeof value === 'string' ? value : null,
        limitBy: limits?.[key]?.by ?? null,
        marginDb: limits?.[key]?.marginDb ?? null,
        expandedUncertainty: uncertainty?.[key]?.expanded ?? null,
      })),
    ),
  );
}

/** The trace that a small drawing of a measure shows; the spectrum, else the first there is, of any other. */
const MAIN_TRACES: Readonly<Record<string, string>> = {
  'level-steps': 'deviation',
  sweep: 'response',
  multitone: 'response',
  jitter: 'closeIn',
  filter: 'response',
};

/**
 * A small drawing of each channel's main trace: 64 heights from 0 to 1, the highest point of each run. A programme
 * shows its sweep, else its first part.
 */
export function sketchOf(record: RecordBody): number[][] {
  const main = MAIN_TRACES[record.measure] ?? 'spectrum';
  const channels = record.channels.map(({ traces }) => traces[main] ?? Object.values(traces)[0]);
  const drawn = channels.filter((trace): trace is Trace => trace !== undefined && trace.x.length > 0);
  if (drawn.length > 0) return drawn.map(sketchTrace);
  const [shared] = Object.values(record.between.traces);
  if (shared) return [sketchTrace(shared)];
  const part = record.segments.find(({ measure }) => measure === 'sweep') ?? record.segments[0];
  return part ? sketchOf(part) : [];
}

function sketchTrace({ x, y, xUnit, yUnit }: Trace): number[] {
  const heights = new Array<number>(SKETCH_POINTS).fill(-Infinity);
  const isFrequency = xUnit === 'Hz' && (x[0] ?? 0) >= 0; // close in, distances lie on both sides of zero
  const place = (value: number) => (isFrequency ? Math.log(Math.max(value, 1)) : value);
  const from = place(isFrequency ? Math.max(10, x[0] ?? 0) : (x[0] ?? 0));
  const span = place(x[x.length - 1] ?? 1) - from || 1;
  for (let n = 0; n < x.length; n++) {
    const share = (place(x[n] ?? 0) - from) / span;
    const bin = Math.min(SKETCH_POINTS - 1, Math.floor(share * SKETCH_POINTS));
    if (bin >= 0) heights[bin] = Math.max(heights[bin] ?? -Infinity, y[n] ?? -Infinity);
  }
  // Between sparse points the line goes on.
  for (let bin = 1; bin < SKETCH_POINTS; bin++)
    if (heights[bin] === -Infinity) heights[bin] = heights[bin - 1] ?? 0;
  const known = heights.filter(Number.isFinite);
  const top = yUnit === 'dBFS' ? 0 : Math.max(...known);
  const bottom = yUnit === 'dBFS' ? SKETCH_FLOOR_DB : Math.min(...known);
  return heights.map((height) => {
    const share = (height - bottom) / (top - bottom || 1);
    return Math.round(Math.min(1, Math.max(0, Number.isFinite(share) ? share : 0)) * 1e3) / 1e3;
  });
}
