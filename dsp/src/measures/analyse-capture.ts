import { proposeFindings } from '../findings/propose-findings.js';
import type { BenchRecord, MeasureId } from '../record/record.js';
import type { MarkMatch } from '../stimulus/locate-marks.js';
import type { StimulusDescriptor } from '../stimulus/descriptor.js';
import { captureFactsOf, type WavFile } from '../wav/wav-file.js';
import type { AnalysisContext, AnalysisSettings } from './measure.js';
import { recognise, type Recognition } from './recognise.js';
import { getMeasure } from './registry.js';

/** What is asked of a capture; without a measure, the recording says which. */
export interface CaptureRequest {
  readonly measure?: MeasureId | null;
  readonly settings?: AnalysisSettings;
  readonly descriptor?: StimulusDescriptor | null;
}

export interface CaptureAnalysis {
  readonly record: BenchRecord;
  /** What the recording was taken for and why; null when the measure was named. */
  readonly recognition: Recognition | null;
}

/** Recognising reads a few seconds of the recording, measuring all of it. */
const RECOGNITION_SHARE = 0.1;

/**
 * Analyses a WAV file: the one way by which command line, server and browser come to a record, so that they agree.
 *
 * @param wav - an opened file
 * @param sha256 - hex SHA-256 of the whole file
 * @param request - which measure with which settings
 * @param options - progress from 0 to 1, and a way to stop
 * @throws DspInputError what the reader, the recognition and the measure throw
 */
export async function analyseCapture(
  wav: WavFile,
  sha256: string,
  { measure, settings = {}, descriptor = settings.descriptor ?? null }: CaptureRequest,
  { onProgress, signal }: Pick<AnalysisContext, 'onProgress' | 'signal'> = {},
): Promise<CaptureAnalysis> {
  const run = async (id: MeasureId, done: number, marks?: MarkMatch | null): Promise<BenchRecord> => {
    const record = await getMeasure(id).analyse(wav, settings, {
      capture: captureFactsOf(wav, sha256),
      fileWarnings: wav.warnings,
      descriptor,
      marks,
      signal,
      onProgress: (share) => onProgress?.(done + share * (1 - done)),
    });
    return { ...record, findings: proposeFindings(record) };
  };
  if (measure) return { record: await run(measure, 0), recognition: null };
  const recognition = await recognise(wav, {
    descriptor,
    signal,
    onProgress: (share) => onProgress?.(share * RECOGNITION_SHARE),
  });
  return { record: await run(recognition.measure, RECOGNITION_SHARE, recognition.marks), recognition };
}
