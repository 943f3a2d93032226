import { DspInputError } from '../../errors.js';
import { makeWarning } from '../../record/make-warning.js';
import type { Warning } from '../../record/record.js';
import type { SampleSource } from '../../source/sample-source.js';
import { layParts, type AlignedPart } from '../shared/align-stimulus.js';
import type { StimulusKnowledge } from '../shared/stimulus-knowledge.js';
import { onsetError } from './find-onsets.js';
import { clockFromTone } from './measure-clock.js';

export interface PlacedParts {
  readonly parts: readonly AlignedPart[];
  /** The player's clock over the recorder's; 1 where nothing tells. */
  readonly speed: number;
  readonly isClockKnown: boolean;
  readonly warnings: readonly Warning[];
}

/** Marks and tone agree to a part in a million on one unbroken recording. */
const SAME_CLOCK = 3e-6;
/** Beginnings that a broken recording moved are seen to this. */
const MOVED_S = 0.008;

/**
 * Lays a programme's parts over the recording. The clock comes from the marks, or from a tone where the two
 * disagree; where samples were lost or doubled on the way, the parts after that are found by their own beginnings.
 *
 * @throws DspInputError `NOT_RECOGNISED` when nothing says where the programme begins
 */
export async function placeParts(
  source: SampleSource,
  { file, delayS, clockOffsetPpm, speed }: StimulusKnowledge,
): Promise<PlacedParts> {
  if (file === null || delayS === null) {
    throw new DspInputError('NOT_RECOGNISED', 'the recording holds no marks of a programme', {
      remedy: 'Record the programme from before its first sound to after its last, or name one of its parts.',
    });
  }
  const durationS = source.frameCount / source.sampleRateHz;
  const byMarks = layParts(file, { delayS, speed, durationS });
  const tone = byMarks.find(({ measure }) => measure === 'tone');
  const toneSpeed = tone === undefined ? null : await clockFromTone(source, tone);
  const isClockKnown = clockOffsetPpm !== null || toneSpeed !== null;
  const isMarksClock =
    toneSpeed === null || (clockOffsetPpm !== null && Math.abs(toneSpeed - speed) <= SAME_CLOCK);
  const trusted = isMarksClock ? speed : toneSpeed;
  const laid = isMarksClock
    ? byMarks
    : layParts(file, { delayS: anchorDelay(delayS, speed, trusted, byMarks), speed: trusted, durationS });
  const { parts, moves } = await followOnsets(source, laid);
  const warnings = moves.map((where) => makeWarning('timeline-broken', { where }));
  return { parts, speed: trusted, isClockKnown, warnings };
}

/** A delay that was solved with another clock keeps the part nearest to the marks where they put it. */
function anchorDelay(
  delayS: number,
  speed: number,
  toneSpeed: number,
  parts: readonly AlignedPart[],
): number {
  // A recorder that started late has the end pair alone.
  const nearest = delayS < 0 ? parts[parts.length - 1] : parts[0];
  const fileS = (nearest.fromS - delayS) * speed;
  return nearest.fromS - fileS / toneSpeed;
}

interface FollowedOnsets {
  readonly parts: readonly AlignedPart[];
  /** Where parts moved against those before them, in words. */
  readonly moves: readonly string[];
}

/** Moves each part to where it begins, and those whose beginning can't be seen with the one before. */
async function followOnsets(source: SampleSource, laid: readonly AlignedPart[]): Promise<FollowedOnsets> {
  const moves: string[] = [];
  const parts: AlignedPart[] = [];
  let byS = 0;
  for (const part of laid) {
    const seen = await onsetError(source, movePart(part, byS));
    if (seen !== null && Math.abs(seen) > MOVED_S) {
      byS += seen;
      moves.push(`before ${part.fromS.toFixed(1)} s (${(seen * 1000).toFixed(0)} ms)`);
    }
    parts.push(movePart(part, byS));
  }
  return { parts, moves };
}

function movePart(part: AlignedPart, byS: number): AlignedPart {
  if (byS === 0) return part;
  return {
    ...part,
    fromS: part.fromS + byS,
    toS: part.toS + byS,
    steps: part.steps.map((step) => ({ ...step, fromS: step.fromS + byS, toS: step.toS + byS })),
  };
}
