import { DspInputError } from '../../errors.js';
import { powerToDb } from '../../level/decibel.js';
import { makeWarning } from '../../record/make-warning.js';
import type { BenchRecord, Figures, Trace, Warning } from '../../record/record.js';
import type { SampleSource } from '../../source/sample-source.js';
import { sweepDurationS } from '../../stimulus/sweep-signal.js';
import type { AnalysisContext, AnalysisSettings, Measure } from '../measure.js';
import { alignStimulus, type AlignedStimulus } from '../shared/align-stimulus.js';
import { assembleRecord } from '../shared/assemble-record.js';
import type { ImpulseResponse } from '../shared/deconvolution/create-deconvolver.js';
import { findArrival, phaseSlope, type Arrival } from '../shared/deconvolution/find-arrival.js';
import { powerAt, transformCut } from '../shared/deconvolution/frequency-response.js';
import { sweepOfPart } from '../shared/deconvolution/sweep-of-part.js';
import { createProgress } from '../shared/progress.js';
import { settleBand, settleHighestHarmonic, shortLevel } from '../shared/settings-band.js';
import { cutWarnings } from '../shared/stimulus-knowledge.js';
import { throwIfCancelled } from '../shared/stream-frames.js';
import { locateSweep } from '../sweep/locate-sweep.js';
import { createLeakReader, type LeakReading } from './leak.js';
import { readTurn, type Turn, type TurnResponses } from './read-parts.js';

/** The sweep in one channel and then in the other: what each leaves in its neighbour, and how alike they are. */
export const separationMeasure: Measure = {
  id: 'separation',
  title: 'Separation and balance',
  analyse: analyseSeparation,
};

const MARKS_SHARE = 0.3;
const SEARCH_S = 0.05;
const PLACES = [
  ['1kHz', 1000],
  ['10kHz', 10_000],
] as const;
const BALANCE_HZ = 1000;
const LOWEST_HZ = 20;
const POINTS_PER_OCTAVE = 24;
/** Either side of an arrival, for comparing both channels' own responses. */
const OWN_S = 0.1;
const DELAY_BAND_HZ = [200, 8000] as const;
const USABLE_SHARE = 0.45;
/** 20 dB: no leak, and joined channels have it alike. */
const FAR_MORE = 10;

interface Arrivals {
  readonly left: Arrival;
  readonly right: Arrival;
  /** Whether each channel's sweep came in the other channel. */
  readonly isExchanged: boolean;
}

async function analyseSeparation(
  source: SampleSource,
  settings: AnalysisSettings,
  context: AnalysisContext,
): Promise<BenchRecord> {
  const progress = createProgress(context.onProgress);
  const band = settleBand(settings, source.sampleRateHz, null);
  if (source.channelCount < 2) {
    throw new DspInputError(
      'NOTHING_MEASURABLE',
      'separation needs two channels, and the recording has one',
      {
        remedy: 'Record both channels in one file.',
      },
    );
  }
  const aligned = await alignStimulus(
    source,
    context,
    { measure: 'separation', assumedName: 'separation' },
    (share) => progress(share * MARKS_SHARE),
  );
  const turns = await placeTurns(source, aligned);
  const leftTurn = await readTurn(source, turns.left);
  throwIfCancelled(context);
  progress((1 + MARKS_SHARE) / 2);
  const rightTurn = await readTurn(source, turns.right);
  progress(1);
  const highHz = Math.min(leftTurn.highHz, USABLE_SHARE * (aligned.file?.sampleRateHz ?? Infinity));
  const arrivals = findArrivals(leftTurn, rightTurn);
  const read = {
    leftToRight: createLeakReader(leftTurn.left, leftTurn.right, arrivals.left.delayS),
    rightToLeft: createLeakReader(rightTurn.right, rightTurn.left, arrivals.right.delayS),
  };
  const own = compareOwn(leftTurn, rightTurn, arrivals);
  const warnings: Warning[] = [];
  const figures: Record<string, Figures[string]> = {};
  for (const [direction, words] of [
    ['leftToRight', 'left to right'],
    ['rightToLeft', 'right to left'],
  ] as const) {
    for (const [place, hz] of PLACES) {
      const key = `separation${direction[0].toUpperCase()}${direction.slice(1)}At${place}Db`;
      const reading = hz <= highHz ? read[direction](hz) : null;
      figures[key] = reading?.separationDb ?? null;
      if (reading !== null && reading.separationDb === null) {
        const values = { direction: words, frequency: hz, least: shortLevel(reading.atLeastDb) };
        warnings.push(makeWarning('separation-in-noise', values, { figures: [key] }));
      }
    }
  }
  const isSwapped = PLACES.slice(0, 1).every(
    ([, hz]) => isNegative(read.leftToRight(hz)) && isNegative(read.rightToLeft(hz)),
  );
  if (isSwapped) warnings.push(makeWarning('channels-swapped'));
  const from = Math.max(0, Math.round(turns.left.fromS * source.sampleRateHz));
  const endS = turns.right.fromS + sweepDurationS(turns.right.sweep) / turns.right.speed;
  const to = Math.min(source.frameCount, Math.round(endS * source.sampleRateHz));
  return assembleRecord(source, settings, context, {
    measure: 'separation',
    range: { from, to: Math.max(from, to) },
    windowName: 'cosine-tapered',
    fftLength: leftTurn.left.samples.length,
    averages: 1,
    bandLowHz: band.lowHz,
    bandHighHz: band.highHz,
    highestHarmonic: settleHighestHarmonic(settings),
    reference: { unitFullScaleDbfs: null, from: null },
    stimulus: {
      name: aligned.name,
      recognisedBy: aligned.recognisedBy,
      delayS: aligned.delayS ?? turns.delayS,
      clockOffsetPpm: aligned.clockOffsetPpm,
      polarity: arrivals.left.isInverted ? 'inverted' : 'same',
    },
    channels: ['left', 'right'].map((channel) => ({
      channel,
      figures: {},
      limits: {},
      uncertainty: {},
      harmonics: [],
      components: [],
      traces: {},
    })),
    between: {
      figures: {
        ...figures,
        balanceDb: own.balanceDb(BALANCE_HZ),
        interchannelDelayS: own.delayS,
        interchannelPolarity: own.isInverted ? 'inverted' : 'same',
      },
      traces: {
        leftToRight: leakTrace(read.leftToRight, highHz),
        rightToLeft: leakTrace(read.rightToLeft, highHz),
        balance: traceOf(frequencies(highHz).map((hz) => [hz, own.balanceDb(hz)])),
      },
    },
    warnings: [...cutWarnings(aligned, context), ...warnings],
  });
}

interface Turns {
  readonly left: Turn;
  readonly right: Turn;
  readonly delayS: number | null;
}

/** @throws DspInputError `NOT_RECOGNISED` when nothing says where the turns lie */
async function placeTurns(source: SampleSource, aligned: AlignedStimulus): Promise<Turns> {
  const parts = aligned.parts.filter(({ measure }) => measure === 'separation');
  const placed = parts.map((part) => ({ part, sweep: sweepOfPart(part) }));
  const turnOf = (channels: string): Turn | null => {
    const found = placed.find(({ part, sweep }) => part.channels === channels && sweep !== null);
    if (!found?.sweep) return null;
    return { sweep: found.sweep, fromS: found.part.fromS, speed: aligned.speed };
  };
  const [left, right] = [turnOf('left'), turnOf('right')];
  if (left !== null && right !== null) return { left, right, delayS: null };
  const described = aligned.file?.parts.filter(({ measure }) => measure === 'separation') ?? [];
  const [first, second] = ['left', 'right'].map((name) =>
    described.find(({ channels }) => channels === name),
  );
  const sweep = first === undefined ? null : sweepOfPart(first);
  // The left turn stands alone in the left channel, so that it can't be taken for the right one's.
  const located = sweep === null ? null : await locateSweep(source, 0, sweep);
  if (located === null || first === undefined || second === undefined) {
    throw new DspInputError(
      'NOT_RECOGNISED',
      'nothing says where each channel’s sweep lies in the recording',
      {
        remedy: 'Record the separation stimulus with its marks, or give its descriptor.',
      },
    );
  }
  return {
    left: { sweep: located.sweep, fromS: located.fromS, speed: 1 },
    right: { sweep: located.sweep, fromS: located.fromS + second.fromS - first.fromS, speed: 1 },
    delayS: located.fromS - first.fromS,
  };
}

function isNegative({ separationDb }: LeakReading): boolean {
  return separationDb !== null && separationDb < 0;
}

/** Arrivals of the driven channels; where they hold nothing, those of their neighbours (swapped cables). */
function findArrivals(left: TurnResponses, right: TurnResponses): Arrivals {
  const inLeft = findCarrier(left.left, left.right, left.highHz);
  const inRight = findCarrier(right.right, right.left, right.highHz);
  if (inLeft === null || inRight === null) {
    throw new DspInputError('NOTHING_MEASURABLE', 'a channel’s turn holds no sweep', {
      remedy: 'Check that both channels were connected and recorded.',
    });
  }
  return {
    left: inLeft.arrival,
    right: inRight.arrival,
    isExchanged: !inLeft.isOwn && !inRight.isOwn,
  };
}

/** A turn's sweep arrives in its own channel, unless the other one holds far more of it. */
function findCarrier(
  own: ImpulseResponse,
  other: ImpulseResponse,
  highHz: number,
): { arrival: Arrival; isOwn: boolean } | null {
  const inOwn = findArrival(own, SEARCH_S, highHz);
  const inOther = findArrival(other, SEARCH_S, highHz);
  if (inOther !== null && inOther.peak > FAR_MORE * (inOwn?.peak ?? 0)) {
    return { arrival: inOther, isOwn: false };
  }
  return inOwn === null ? null : { arrival: inOwn, isOwn: true };
}

/** Compares each channel's own response in its own turn. */
function compareOwn(
  left: TurnResponses,
  right: TurnResponses,
  arrivals: Arrivals,
): { balanceDb: (hz: number) => number; delayS: number; isInverted: boolean } {
  const cut = { beforeS: OWN_S, afterS: OWN_S };
  const [ofLeft, ofRight] = arrivals.isExchanged ? [right.left, left.right] : [left.left, right.right];
  const one = transformCut(ofLeft, { ...cut, centreS: arrivals.left.delayS });
  const other = transformCut(ofRight, { ...cut, centreS: arrivals.left.delayS });
  const re = one.re.map((x, k) => other.re[k] * x + other.im[k] * one.im[k]);
  const im = one.re.map((x, k) => other.im[k] * x - other.re[k] * one.im[k]);
  const { delayS, phase } = phaseSlope(
    { binWidthHz: one.binWidthHz, re, im },
    DELAY_BAND_HZ[0],
    Math.min(DELAY_BAND_HZ[1], left.highHz / 2),
  );
  return {
    balanceDb: (hz) => powerToDb(powerAt(other, hz) / powerAt(one, hz)),
    delayS,
    isInverted: Math.cos(phase) < 0,
  };
}

function frequencies(highHz: number): number[] {
  const count = Math.floor(POINTS_PER_OCTAVE * Math.log2(highHz / LOWEST_HZ));
  return Array.from({ length: count + 1 }, (_, index) => LOWEST_HZ * 2 ** (index / POINTS_PER_OCTAVE));
}

function leakTrace(read: (hz: number) => LeakReading, highHz: number): Trace {
  return traceOf(
    frequencies(highHz).flatMap((hz): [number, number][] => {
      const { separationDb } = read(hz);
      return separationDb === null ? [] : [[hz, separationDb]];
    }),
  );
}

function traceOf(points: readonly (readonly [number, number])[]): Trace {
  const finite = points.filter(([, y]) => Number.isFinite(y));
  return {
    xUnit: 'Hz',
    yUnit: 'dB',
    x: Float64Array.from(finite, ([x]) => x),
    y: Float64Array.from(finite, ([, y]) => y),
  };
}
