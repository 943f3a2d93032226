import { createRealFft } from '../../spectrum/create-real-fft.js';
import type { SampleSource } from '../../source/sample-source.js';
import { createStimulus } from '../../stimulus/create-stimulus.js';
import { sweepDurationS, type SweepSignal } from '../../stimulus/sweep-signal.js';
import { createWindow } from '../../window/create-window.js';
import type { AnalysisContext } from '../measure.js';
import {
  AFTER_SWEEP_S,
  BEFORE_SWEEP_S,
  createDeconvolver,
} from '../shared/deconvolution/create-deconvolver.js';
import { findArrival } from '../shared/deconvolution/find-arrival.js';
import { sweepOfPart } from '../shared/deconvolution/sweep-of-part.js';
import { throwIfCancelled } from '../shared/stream-frames.js';

/** A sweep found without marks. */
export interface LocatedSweep {
  readonly sweep: SweepSignal;
  /** The recording's second at which it begins; may be negative. */
  readonly fromS: number;
}

/** Longer recordings are searched only in their beginning: a bare sweep is no longer. */
const LONGEST_LOOK_S = 60;
/** An impulse stands so far above the rest of a response to the right sweep. */
const LEAST_PEAK = 12;

/** Finds a known sweep anywhere in a recording, by dividing the whole recording by it. */
export async function locateSweep(
  source: SampleSource,
  channel: number,
  sweep: SweepSignal,
): Promise<LocatedSweep | null> {
  const { sampleRateHz } = source;
  const frames = Math.min(source.frameCount, Math.round(LONGEST_LOOK_S * sampleRateHz));
  const samples = (await source.read(0, frames))[channel];
  // Room for a sweep that began before the recording did: what is negative wraps to the end.
  const room = Math.ceil(sweepDurationS(sweep) * sampleRateHz);
  const deconvolver = createDeconvolver({
    sweep,
    speed: 1,
    sampleRateHz,
    leadS: 0,
    frameCount: frames + room,
  });
  const impulse = deconvolver.deconvolve(samples);
  const arrival = findArrival(impulse, null, deconvolver.highHz);
  if (arrival === null) return null;
  const rms = Math.sqrt(
    impulse.samples.reduce((sum, x) => sum + x * x, 0) / Math.max(1, impulse.samples.length),
  );
  const at = Math.round(arrival.delayS * sampleRateHz);
  const total = impulse.samples.length;
  const peak = Math.abs(impulse.samples[((at % total) + total) % total]);
  return peak > LEAST_PEAK * rms ? { sweep, fromS: arrival.delayS } : null;
}

/** A sweep with the clock that the recording itself tells. */
export interface RefinedSweep extends LocatedSweep {
  readonly speed: number;
  readonly isClockKnown: boolean;
  readonly isInverted: boolean;
}

const ROUNDS = 5;
/** Growth of the delay with ln f that is left: below the first nothing more is gained, below the second the clock counts. */
const SETTLED_S = 2e-9;
const KNOWN_S = 2e-7;
/** A growth beyond this is none of a clock. */
const MOST_PER_LOG_S = 0.05;
const REACH_S = 0.1;
const MIDDLE_HZ = 1000;

/**
 * Settles a bare sweep's beginning and the player's clock: clocks that differ make the delay grow with ln f.
 *
 * @returns the place as it was found where the recording doesn't tell the clock
 */
export async function refineSweep(
  source: SampleSource,
  channel: number,
  located: LocatedSweep,
): Promise<RefinedSweep> {
  const { sweep } = located;
  const { sampleRateHz, frameCount } = source;
  let place = { fromS: located.fromS, speed: 1 };
  let [left, isInverted] = [Infinity, false];
  for (let round = 0; round < ROUNDS && left > SETTLED_S; round++) {
    const from = Math.min(frameCount, Math.max(0, Math.round((place.fromS - BEFORE_SWEEP_S) * sampleRateHz)));
    const endS = place.fromS + sweepDurationS(sweep) / place.speed + AFTER_SWEEP_S;
    const count = Math.max(0, Math.min(frameCount, Math.round(endS * sampleRateHz)) - from);
    const leadS = place.fromS - from / sampleRateHz;
    const deconvolver = createDeconvolver({
      sweep,
      speed: place.speed,
      sampleRateHz,
      leadS,
      frameCount: count,
    });
    const impulse = deconvolver.deconvolve((await source.read(from, count))[channel]);
    const arrival = findArrival(impulse, REACH_S, deconvolver.highHz, true);
    if (arrival === null || Math.abs(arrival.perLogS) > MOST_PER_LOG_S) break;
    left = Math.abs(arrival.perLogS);
    isInverted = arrival.isInverted;
    const speed = place.speed / (1 + (arrival.perLogS * place.speed) / sweep.rateS);
    // The delay was fitted as it is at 1 kHz; the sweep's beginning follows from it.
    const passedS = (v: number): number => (sweep.rateS / v) * Math.log(MIDDLE_HZ / (sweep.lowHz * v));
    place = { fromS: place.fromS + arrival.delayS + passedS(place.speed) - passedS(speed), speed };
  }
  return left < KNOWN_S
    ? { sweep, ...place, isClockKnown: true, isInverted }
    : { ...located, speed: 1, isClockKnown: false, isInverted };
}

const FRAME_S = 0.085;
const HOP_SHARE = 0.5;
/** A ridge must go through so many octaves to be a sweep. */
const LEAST_OCTAVES = 3;
/** … and follow ln f = a + t/L within this, ln f. */
const STRAIGHT = 0.03;
const LEAST_FRAMES = 8;
const USUAL_RATES_HZ = [44_100, 48_000, 88_200, 96_000, 176_400, 192_000];
/** How near a usual sweep's rate must lie to what is seen. */
const SAME_RATE = 0.02;

interface RidgePoint {
  readonly atS: number;
  readonly lnHz: number;
}

/**
 * Recognises a sweep by its rising tone: the logarithm of its frequency grows evenly.
 *
 * @returns the usual sweep that goes with it, else one made from what was seen; null for anything else
 */
export async function recogniseSweep(
  source: SampleSource,
  channel: number,
  context: Pick<AnalysisContext, 'signal'>,
): Promise<SweepSignal | null> {
  const ridge = await followRidge(source, channel, context);
  const line = longestRise(ridge);
  if (line === null) return null;
  const { rateS, highHz } = line;
  const usual = USUAL_RATES_HZ.map((sampleRateHz) =>
    sweepOfPart(createStimulus('sweep', { sampleRateHz, bitsPerSample: 24 }).describe('').parts[0]),
  ).filter((sweep) => sweep !== null);
  const fitting = usual
    .filter((sweep) => Math.abs(sweep.rateS / rateS - 1) < SAME_RATE && sweep.highHz > 0.9 * highHz)
    .sort((one, other) => one.highHz - other.highHz);
  const seen = { lowHz: usual[0].lowHz, highHz: highHz * 1.05, rateS, fadeInS: 0, fadeOutS: 0.03 };
  return fitting.at(0) ?? seen;
}

async function followRidge(
  source: SampleSource,
  channel: number,
  context: Pick<AnalysisContext, 'signal'>,
): Promise<RidgePoint[]> {
  const { sampleRateHz } = source;
  const length = 2 ** Math.round(Math.log2(FRAME_S * sampleRateHz));
  const hop = Math.round(length * HOP_SHARE);
  const fft = createRealFft(length);
  const window = createWindow('hann', length);
  const re = new Float64Array(length / 2 + 1);
  const im = new Float64Array(length / 2 + 1);
  const points: RidgePoint[] = [];
  const end = Math.min(source.frameCount, Math.round(LONGEST_LOOK_S * sampleRateHz)) - length;
  for (let from = 0; from <= end; from += hop) {
    throwIfCancelled(context);
    const samples = (await source.read(from, length))[channel];
    fft.transform(
      samples.map((x, n) => x * window.samples[n]),
      re,
      im,
    );
    let [best, at, total] = [0, 0, 0];
    for (let k = 2; k < re.length; k++) {
      const power = re[k] * re[k] + im[k] * im[k];
      total += power;
      if (power > best) [best, at] = [power, k];
    }
    // A rising tone smears over some bins, but holds most of what there is.
    if (best > 0.05 * total && best > 0) {
      points.push({
        atS: (from + length / 2) / sampleRateHz,
        lnHz: Math.log((at * sampleRateHz) / length),
      });
    }
  }
  return points;
}

/** The longest run of points on one rising line. */
function longestRise(points: readonly RidgePoint[]): { rateS: number; highHz: number } | null {
  // Low frequencies lie on few bins: the line is taken from where bins are fine.
  const fine = points.filter(({ lnHz }) => lnHz > Math.log(200));
  let best: { rateS: number; highHz: number; count: number } | null = null;
  for (let from = 0; from + LEAST_FRAMES <= fine.length; from++) {
    let to = from + 1;
    while (to < fine.length && isStep(fine[to - 1], fine[to])) to++;
    const run = fine.slice(from, to);
    const line = fitLine(run);
    if (line !== null && run.length > (best?.count ?? 0)) best = { ...line, count: run.length };
    from = Math.max(from, to - 1);
  }
  return best;
}

function isStep(one: RidgePoint, other: RidgePoint): boolean {
  const rise = other.lnHz - one.lnHz;
  return rise > 0 && rise < 0.5 && other.atS - one.atS < 0.2;
}

function fitLine(run: readonly RidgePoint[]): { rateS: number; highHz: number } | null {
  if (run.length < LEAST_FRAMES) return null;
  const last = run[run.length - 1];
  if (last.lnHz - run[0].lnHz < LEAST_OCTAVES * Math.LN2) return null;
  const n = run.length;
  const meanT = run.reduce((sum, { atS }) => sum + atS, 0) / n;
  const meanF = run.reduce((sum, { lnHz }) => sum + lnHz, 0) / n;
  const slope =
    run.reduce((sum, { atS, lnHz }) => sum + (atS - meanT) * (lnHz - meanF), 0) /
    run.reduce((sum, { atS }) => sum + (atS - meanT) ** 2, 0);
  const off = run.map(({ atS, lnHz }) => Math.abs(lnHz - meanF - slope * (atS - meanT)));
  off.sort((one, other) => one - other);
  return slope > 0 && off[Math.floor(0.9 * n)] < STRAIGHT
    ? { rateS: 1 / slope, highHz: Math.exp(last.lnHz) }
    : null;
}
