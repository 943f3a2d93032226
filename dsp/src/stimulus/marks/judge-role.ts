import { RAMP_S } from '../bodies/body.js';
import { MARK_DURATION_S, MARK_LEVEL_DBFS } from '../mark-chirp.js';
import {
  BESIDE_BODY_S,
  LEAD_IN_FREQUENCY_HZ,
  LEAD_IN_LEVEL_DBFS,
  MARK_TO_BODY_S,
} from '../stimulus-layout.js';
import type { RefinedMark } from './refine-mark.js';

/** Reads a run of the channel in question, cut to the recording. */
export type ReadSpan = (fromS: number, toS: number) => Promise<Float64Array>;

const MARGIN_S = 0.02;
const LOOK_AFTER_S = 0.5;
const SHORTEST_LOOK_S = 0.1;
/** The body must stand this far above the quiet between it and the marks, power. */
const LEAST_RISE = 4;
const LEAD_IN_RATIO_DB = LEAD_IN_LEVEL_DBFS - MARK_LEVEL_DBFS;
const LEAD_IN_TOLERANCE_DB = 3;

function varianceOf(samples: Float64Array): number {
  const mean = samples.reduce((sum, x) => sum + x, 0) / samples.length;
  return samples.reduce((sum, x) => sum + (x - mean) ** 2, 0) / samples.length;
}

/** Peak of a tone in samples, seen through a raised cosine. */
function toneAmplitude(samples: Float64Array, frequencyHz: number, sampleRateHz: number): number {
  let re = 0;
  let im = 0;
  let sum = 0;
  samples.forEach((x, n) => {
    const weight = 1 - Math.cos((2 * Math.PI * (n + 0.5)) / samples.length);
    const phase = (2 * Math.PI * frequencyHz * n) / sampleRateHz;
    re += weight * x * Math.cos(phase);
    im += weight * x * Math.sin(phase);
    sum += weight;
  });
  return (2 * Math.hypot(re, im)) / sum;
}

/**
 * Tells the start pair from the end pair where only one was recorded: a body follows the start pair after a quiet
 * moment, and the lead-in, 20 dB below the marks, goes before it.
 *
 * @param marks - the pair
 * @param sampleRateHz - of the recording
 */
export async function isStartPair(
  read: ReadSpan,
  [first, second]: readonly [RefinedMark, RefinedMark],
  sampleRateHz: number,
): Promise<boolean> {
  const quietFromS = second.atS + MARK_DURATION_S + MARGIN_S;
  const quiet = await read(quietFromS, quietFromS + BESIDE_BODY_S - 2 * MARGIN_S);
  const bodyFromS = second.atS + MARK_TO_BODY_S + RAMP_S + MARGIN_S;
  const body = await read(bodyFromS, bodyFromS + LOOK_AFTER_S);
  const shortest = SHORTEST_LOOK_S * sampleRateHz;
  if (body.length >= shortest && varianceOf(body) > LEAST_RISE * varianceOf(quiet)) return true;
  const before = await read(first.atS - 0.9, first.atS - 0.4);
  if (before.length < shortest) return false;
  const tone = toneAmplitude(before, LEAD_IN_FREQUENCY_HZ, sampleRateHz);
  const ratioDb = 20 * Math.log10(tone / Math.abs(first.amplitude));
  return Math.abs(ratioDb - LEAD_IN_RATIO_DB) < LEAD_IN_TOLERANCE_DB;
}
