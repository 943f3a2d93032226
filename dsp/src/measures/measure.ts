import type { BenchRecord, Calibration, MeasureId, Warning } from '../record/record.js';
import type { CaptureFacts, SampleSource } from '../source/sample-source.js';
import type { StimulusDescriptor } from '../stimulus/descriptor.js';
import type { MarkMatch } from '../stimulus/locate-marks.js';
import type { AlignedStimulus } from './shared/align-stimulus.js';

/** What a person may ask for; what is left out takes the measure's default and stands in the record's settings. */
export interface AnalysisSettings {
  readonly fromS?: number;
  readonly toS?: number;
  readonly bandLowHz?: number;
  readonly bandHighHz?: number;
  readonly highestHarmonic?: number;
  readonly channel?: 'left' | 'right' | 'all';
  readonly calibration?: Calibration | null;
  readonly baseline?: BenchRecord | null;
  /** Of the stimulus that was played; a descriptor in the request comes before it. */
  readonly descriptor?: StimulusDescriptor | null;
}

export interface AnalysisContext {
  readonly capture: CaptureFacts;
  /** What the reader had to say of the file; it comes first among the record's warnings. */
  readonly fileWarnings?: readonly Warning[];
  readonly descriptor?: StimulusDescriptor | null;
  /** Where everything lies, for a part of a programme that is placed already: nobody looks for marks then. */
  readonly placed?: AlignedStimulus | null;
  /** The marks in the capture, when somebody has looked for them already; null where there are none. */
  readonly marks?: MarkMatch | null;
  /** Told the share of the work done, 0 to 1, never falling. */
  readonly onProgress?: (share: number) => void;
  /** Looked at between blocks; once aborted, the analysis throws `CANCELLED`. */
  readonly signal?: { readonly aborted: boolean };
}

/** One way to analyse a capture. Command line, worker, server and pages find it in the registry. */
export interface Measure {
  readonly id: MeasureId;
  /** What it is called on a page. */
  readonly title: string;
  analyse(source: SampleSource, settings: AnalysisSettings, context: AnalysisContext): Promise<BenchRecord>;
}
