import { MARK_DURATION_S } from '../mark-chirp.js';
import { gapOfMarkCode } from '../mark-codes.js';
import type { ReadSpan } from './judge-role.js';
import type { CandidatePair } from './pair-candidates.js';
import { refineMark, type RefinedMark } from './refine-mark.js';
import type { MarkPair } from './solve-times.js';

/** A pair that stands up to a close look. */
export interface VerifiedPair {
  readonly code: number;
  readonly marks: MarkPair;
  readonly likeness: number;
}

/** Two plays of a file and some; the likeliest come first, so that more would add nothing. */
const MOST_TRIES = 24;
/** Recorded beside a mark. */
const BESIDE_MARK_S = 0.002;
/** 300 ppm, and some microseconds for noise. */
const CLOCK_TOLERANCE = 3e-4;
const NOISE_TOLERANCE_S = 2e-5;
const MOST_RATIO = 1.3;

/** Looks at one mark at the recording's full rate. */
export async function lookAtMark(
  read: ReadSpan,
  sampleRateHz: number,
  near: { readonly atS: number; readonly speed: number; readonly isStartKnown: boolean },
): Promise<RefinedMark | null> {
  const fromFrame = Math.max(0, Math.floor((near.atS - BESIDE_MARK_S) * sampleRateHz));
  const fromS = fromFrame / sampleRateHz;
  const samples = await read(fromS, near.atS + MARK_DURATION_S + BESIDE_MARK_S);
  return refineMark({ samples, fromS, sampleRateHz }, near.atS, near.speed, near.isStartKnown);
}

function isPair(code: number, [first, second]: MarkPair): boolean {
  const gapS = gapOfMarkCode(code);
  const ratio = first.amplitude / second.amplitude;
  const isInTime = Math.abs(second.atS - first.atS - gapS) < gapS * CLOCK_TOLERANCE + NOISE_TOLERANCE_S;
  // A ratio below 0 is one of two polarities.
  return isInTime && ratio < MOST_RATIO && ratio > 1 / MOST_RATIO;
}

/** Looks closely at the likeliest pairs and keeps those that are pairs of marks, in order of time. */
export async function verifyPairs(
  read: ReadSpan,
  sampleRateHz: number,
  candidates: readonly CandidatePair[],
): Promise<VerifiedPair[]> {
  const verified: VerifiedPair[] = [];
  for (const { code, marks } of candidates.slice(0, MOST_TRIES)) {
    const first = await lookAtMark(read, sampleRateHz, { atS: marks[0].atS, speed: 1, isStartKnown: false });
    if (!first) continue;
    const second = await lookAtMark(read, sampleRateHz, { atS: marks[1].atS, speed: 1, isStartKnown: false });
    if (!second || !isPair(code, [first, second])) continue;
    const likeness = Math.min(marks[0].likeness, marks[1].likeness);
    verified.push({ code, marks: [first, second], likeness });
  }
  return verified.sort((one, other) => one.marks[0].atS - other.marks[0].atS);
}
