import type { StimulusDescriptor } from '../descriptor.js';
import { gapOfMarkCode, isMarkCode } from '../mark-codes.js';
import { standardDescriptor } from '../standard-descriptor.js';
import { layOutStimulus } from '../stimulus-layout.js';

/** Where the marks lie in a file, from their code or from the file's descriptor; seconds from its first frame. */
export interface MarkLayout {
  readonly code: number;
  readonly name: string | null;
  /** Beginning of the start pair. */
  readonly startS: number;
  /** Beginning of the end pair; null when the code doesn't tell. */
  readonly endS: number | null;
}

/** Any file with marks begins alike, however long its body is and whatever its rate. */
const ANY = { bodyFrames: 48_000, sampleRateHz: 48_000 };
/** Rounding of the seconds in a descriptor. */
const SAME_GAP_S = 1e-6;

/** Gives what a code alone tells. */
export function layoutOfCode(code: number): MarkLayout {
  const file = standardDescriptor(code);
  const { marks } = file ?? layOutStimulus(ANY.bodyFrames, ANY.sampleRateHz, code);
  return { code, name: file?.name ?? null, startS: marks[0].atS, endS: file ? marks[2].atS : null };
}

/** Gives what a descriptor tells; null when its file has no two pairs of marks with a gap of the table. */
export function layoutOfDescriptor({ marks, name }: StimulusDescriptor): MarkLayout | null {
  const [first, second, third] = marks;
  if (marks.length !== 4) return null;
  const gapS = second.atS - first.atS;
  const code = Math.round(gapS * 100) - 30;
  if (!isMarkCode(code) || Math.abs(gapS - gapOfMarkCode(code)) > SAME_GAP_S) return null;
  return { code, name, startS: first.atS, endS: third.atS };
}
