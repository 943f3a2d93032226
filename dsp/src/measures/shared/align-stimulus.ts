import type { MeasureId } from '../../record/record.js';
import type { SampleSource } from '../../source/sample-source.js';
import type { StimulusChannels, StimulusDescriptor, StimulusPart } from '../../stimulus/descriptor.js';
import type { AnalysisContext } from '../measure.js';
import { gatherStimulus, type StimulusKnowledge } from './stimulus-knowledge.js';

/** A step of a part, in the recording's seconds. */
export interface AlignedStep {
  readonly levelDbfs: number;
  readonly fromS: number;
  readonly toS: number;
  /** False where the recording begins after it did or ends before it does. */
  readonly isWhole: boolean;
}

/** A part of the stimulus as it lies in the recording. */
export interface AlignedPart {
  readonly measure: MeasureId;
  readonly channels: StimulusChannels;
  readonly parameters: StimulusPart['parameters'];
  /** Where the part begins and ends, in the recording's seconds; not cut to the recording. */
  readonly fromS: number;
  readonly toS: number;
  /** False where the recording holds the part only in part, or not at all. */
  readonly isWhole: boolean;
  readonly steps: readonly AlignedStep[];
}

/** What is known of the stimulus, and where it lies in the recording. */
export interface AlignedStimulus extends StimulusKnowledge {
  /** Parts of the measure asked for; empty when nothing says where they lie. */
  readonly parts: readonly AlignedPart[];
}

/** Rounding of times in a descriptor and of the marks' own; a part cut by less is whole. */
const WHOLE_TOLERANCE_S = 0.002;

/**
 * Gathers what marks and descriptor say of the stimulus and lays its parts over the recording.
 *
 * @param source - the capture whole; read once from end to end, unless the context says where everything lies
 * @param measure - whose parts are wanted
 * @param assumedName - what the measure takes the recording for when nothing says
 * @returns parts in the recording's seconds, clock and delay taken into account; none without both marks (or a placement)
 *   and a known file
 */
export async function alignStimulus(
  source: SampleSource,
  context: Pick<AnalysisContext, 'descriptor' | 'signal' | 'placed' | 'marks'>,
  { measure, assumedName }: { readonly measure: MeasureId; readonly assumedName: string },
  onShare: (share: number) => void = () => undefined,
): Promise<AlignedStimulus> {
  if (context.placed) return context.placed;
  const knowledge = await gatherStimulus(source, context, assumedName, onShare);
  const { file, delayS, speed } = knowledge;
  const durationS = source.frameCount / source.sampleRateHz;
  const parts =
    file === null || delayS === null
      ? []
      : layParts(file, { delayS, speed, durationS }).filter((part) => part.measure === measure);
  return { ...knowledge, parts };
}

/** How a stimulus file lies in a recording. */
export interface FilePlace {
  /** The recording's second at which the file's first frame falls. */
  readonly delayS: number;
  /** The player's clock over the recorder's. */
  readonly speed: number;
  readonly durationS: number;
}

/** Lays every part of a file over a recording. */
export function layParts(file: StimulusDescriptor, { delayS, speed, durationS }: FilePlace): AlignedPart[] {
  const at = (fileS: number): number => delayS + fileS / speed;
  const isWithin = (fromS: number, toS: number): boolean =>
    fromS >= -WHOLE_TOLERANCE_S && toS <= durationS + WHOLE_TOLERANCE_S;
  return file.parts.map(({ measure, channels, parameters, fromS, toS, steps }) => ({
    measure,
    channels,
    parameters,
    fromS: at(fromS),
    toS: at(toS),
    isWhole: isWithin(at(fromS), at(toS)),
    steps: steps.map((step) => ({
      levelDbfs: step.levelDbfs,
      fromS: at(step.fromS),
      toS: at(step.toS),
      isWhole: isWithin(at(step.fromS), at(step.toS)),
    })),
  }));
}

/** A part's parameter that must be a number. */
export function partNumber(part: Pick<AlignedPart, 'parameters'>, key: string): number | null {
  const value = part.parameters[key];
  return typeof value === 'number' && Number.isFinite(value) ? value : null;
}
