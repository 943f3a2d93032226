import { DspInputError } from '../errors.js';
import type { MeasureId } from '../record/record.js';
import type { SampleSource } from '../source/sample-source.js';
import type { StimulusDescriptor } from '../stimulus/descriptor.js';
import type { AnalysisContext } from './measure.js';
import { measures } from './registry.js';
import { recogniseSignal } from './shared/recognise-signal.js';
import { STIMULUS_MEASURES } from './shared/stimulus-knowledge.js';

/** What a recording was taken for. */
export interface Recognition {
  readonly measure: MeasureId;
  /** A sentence for people. */
  readonly why: string;
  /** null where the signal alone told the kind. */
  readonly stimulusName: string | null;
}

export interface RecognitionOptions extends Pick<AnalysisContext, 'onProgress' | 'signal'> {
  readonly descriptor?: StimulusDescriptor | null;
}

/**
 * Tells what a recording holds: by the descriptor beside it, else by its signal.
 *
 * @throws DspInputError `NOT_RECOGNISED` with what was found; `EMPTY_SIGNAL`, `SEGMENT_TOO_SHORT`, `CANCELLED`
 */
export async function recognise(
  source: SampleSource,
  options: RecognitionOptions = {},
): Promise<Recognition> {
  const { descriptor } = options;
  if (descriptor) {
    return {
      measure: measureOf(descriptor),
      why: `the descriptor beside the file names the stimulus "${descriptor.name}"`,
      stimulusName: descriptor.name,
    };
  }
  return { ...(await recogniseSignal(source, options)), stimulusName: null };
}

function measureOf(descriptor: StimulusDescriptor): MeasureId {
  const id = STIMULUS_MEASURES[descriptor.name] ?? descriptor.parts[0]?.measure;
  if (id !== undefined && measures.some((measure) => measure.id === id)) return id;
  throw new DspInputError(
    'NOT_RECOGNISED',
    `the recording is one of the stimulus "${descriptor.name}", for which there is no measure`,
    {
      remedy: 'Name a measure to look at it all the same.',
    },
  );
}
