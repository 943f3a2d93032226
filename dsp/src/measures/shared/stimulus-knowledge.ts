import { makeWarning } from '../../record/make-warning.js';
import type { StimulusMatch, Warning } from '../../record/record.js';
import type { SampleSource } from '../../source/sample-source.js';
import { locateMarks, type MarkMatch } from '../../stimulus/locate-marks.js';
import type { StimulusDescriptor } from '../../stimulus/descriptor.js';
import { standardDescriptor } from '../../stimulus/standard-descriptor.js';
import { findStimulusKind } from '../../stimulus/stimulus-kinds.js';
import type { AnalysisContext } from '../measure.js';
import type { KnownPart } from './open-analysis.js';

/** What is known of the stimulus before anything is measured. */
export interface StimulusKnowledge {
  readonly name: string;
  readonly recognisedBy: StimulusMatch['recognisedBy'];
  readonly delayS: number | null;
  readonly clockOffsetPpm: number | null;
  readonly polarity: StimulusMatch['polarity'];
  /** Where its body lies in the recording; null when levels must tell. */
  readonly part: KnownPart | null;
  readonly frequencyHz: number | null;
  readonly levelDbfs: number | null;
  /** The file that was played: as its descriptor says, else as its marks name it; null where neither does. */
  readonly file: StimulusDescriptor | null;
  /** Whether the levels in `file` are those that were played: marks alone don't tell of a file scaled as a whole. */
  readonly isLevelKnown: boolean;
  /** The player's clock over the recorder's; 1 where it isn't known. */
  readonly speed: number;
}

/** Filters of player and recorder ring on past a body's ramps for less than this. */
const SETTLING_S = 0.05;
const SHORTEST_BODY_S = 0.2;
const WHOLE_S = 0.002;

/**
 * Gathers what marks and descriptor say of the stimulus.
 *
 * @param source - the capture whole; read once from end to end, unless the marks are known
 * @param assumedName - what the measure takes the recording for when nothing says
 * @returns frequency and level where they are known: the marks name a kind with its default parameters, but the level only of
 *   kinds whose figures rest on it (others may have been scaled as a whole)
 */
export async function gatherStimulus(
  source: SampleSource,
  context: Pick<AnalysisContext, 'descriptor' | 'signal' | 'placed' | 'marks'>,
  assumedName: string,
  onShare: (share: number) => void = () => undefined,
): Promise<StimulusKnowledge> {
  if (context.placed) return context.placed;
  const { descriptor = null, signal } = context;
  const marks =
    context.marks !== undefined
      ? context.marks
      : await locateMarks(source, { descriptor, signal, onProgress: onShare });
  const name = marks?.stimulusName ?? descriptor?.name ?? assumedName;
  const kind = marks === null ? null : findStimulusKind(marks.stimulusName);
  const file = descriptor ?? (marks === null ? null : standardDescriptor(marks.code));
  const isLevelKnown = descriptor !== null || kind?.isLevelNamed === true;
  const parameter = (key: string): number | null => {
    const value = file?.parameters[key];
    return typeof value === 'number' && Number.isFinite(value) ? value : null;
  };
  return {
    name,
    recognisedBy: marks !== null ? 'marks' : descriptor !== null ? 'descriptor' : 'signal',
    delayS: marks?.delayS ?? null,
    clockOffsetPpm: marks?.clockOffsetPpm ?? null,
    polarity: marks?.polarity ?? null,
    part: marks === null ? null : settledBody(marks),
    frequencyHz: parameter('frequencyHz'),
    levelDbfs: isLevelKnown ? parameter('levelDbfs') : null,
    file,
    isLevelKnown,
    speed: 1 + (marks?.clockOffsetPpm ?? 0) * 1e-6,
  };
}

/** A body too short to hold a measure leaves the place to the levels. */
function settledBody({ bodyFromS, bodyToS }: MarkMatch): KnownPart | null {
  if (bodyToS - bodyFromS < SHORTEST_BODY_S) return null;
  const settling = Math.min(SETTLING_S, (bodyToS - bodyFromS) / 8);
  return { fromS: bodyFromS + settling, toS: bodyToS - settling };
}

/** What the capture as a whole lacks of the stimulus; nothing where neither marks nor a descriptor tell. */
export function cutWarnings(
  { delayS }: StimulusKnowledge,
  { capture, descriptor, placed }: Pick<AnalysisContext, 'capture' | 'descriptor' | 'placed'>,
): Warning[] {
  // A programme tells of its parts one by one.
  if (delayS === null || placed) return [];
  const warnings: Warning[] = [];
  // Marks are placed to a few samples: a hair below zero is no cut.
  if (delayS < -WHOLE_S)
    warnings.push(
      makeWarning('recording-cut', { where: `began ${(-delayS).toFixed(2)} s after the stimulus` }),
    );
  const missingS = descriptor
    ? delayS + descriptor.frameCount / descriptor.sampleRateHz - capture.durationS
    : 0;
  // Clocks 200 ppm apart move the end of a long file by some hundredths of a second.
  if (missingS > 0.1)
    warnings.push(
      makeWarning('recording-cut', { where: `ended ${missingS.toFixed(2)} s before the stimulus` }),
    );
  return warnings;
}
