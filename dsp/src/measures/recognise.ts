import { DspInputError } from '../errors.js';
import type { MeasureId } from '../record/record.js';
import type { SampleSource } from '../source/sample-source.js';
import { locateMarks, type MarkMatch } from '../stimulus/locate-marks.js';
import { findStimulusKind } from '../stimulus/stimulus-kinds.js';
import type { StimulusDescriptor } from '../stimulus/descriptor.js';
import type { AnalysisContext } from './measure.js';
import { measures } from './registry.js';
import { recogniseSignal } from './recognise-by-signal/recognise-signal.js';

/** What a recording was taken for. */
export interface Recognition {
  readonly measure: MeasureId;
  /** A sentence for people. */
  readonly why: string;
  /** null where the signal alone told the kind. */
  readonly stimulusName: string | null;
  /** Those found in the recording, so that the measure needn't look for them again. */
  readonly marks: MarkMatch | null;
}

export interface RecognitionOptions extends Pick<AnalysisContext, 'onProgress' | 'signal'> {
  readonly descriptor?: StimulusDescriptor | null;
}

/** Share of the work that the search for marks takes. */
const MARKS_SHARE = 0.5;

/**
 * Tells what a recording holds: by the marks in it, else by the descriptor beside it, else by its signal.
 *
 * @throws DspInputError `NOT_RECOGNISED` with what was found; `EMPTY_SIGNAL`, `SEGMENT_TOO_SHORT`, `CANCELLED`
 */
export async function recognise(
  source: SampleSource,
  options: RecognitionOptions = {},
): Promise<Recognition> {
  const { descriptor = null, signal, onProgress } = options;
  const marks = await locateMarks(source, {
    descriptor,
    signal,
    onProgress: (share) => onProgress?.(share * MARKS_SHARE),
  });
  const name = marks?.stimulusName ?? descriptor?.name ?? null;
  if (name !== null) {
    const where = marks?.stimulusName
      ? 'the marks in the recording name'
      : 'the descriptor beside the file names';
    return {
      measure: measureOf(name, descriptor),
      why: `${where} the stimulus "${name}"`,
      stimulusName: name,
      marks,
    };
  }
  const bySignal = await recogniseSignal(source, {
    signal,
    onProgress: (share) => onProgress?.(MARKS_SHARE + share * (1 - MARKS_SHARE)),
  });
  return { ...bySignal, stimulusName: null, marks };
}

function measureOf(name: string, descriptor: StimulusDescriptor | null): MeasureId {
  const kind = findStimulusKind(name);
  const id = kind?.measure ?? (descriptor?.name === name ? descriptor.parts[0]?.measure : undefined);
  if (id !== undefined && measures.some((measure) => measure.id === id)) return id;
  throw new DspInputError(
    'NOT_RECOGNISED',
    `the recording is one of the stimulus "${name}", for which there is no measure`,
    {
      remedy: 'Name a measure to look at it all the same.',
    },
  );
}
