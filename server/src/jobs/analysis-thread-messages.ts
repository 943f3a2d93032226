import type { BenchRecord, DspErrorCode, DspErrorDetails } from '@benchlark/dsp';
import type { Overview } from '../captures/capture-overview.entity';

export interface AnalysisOutcome {
  /** With every trace in full. */
  readonly record: BenchRecord;
  readonly overview: Overview;
  /** What the recording was taken for and why; null when the measure was asked for. */
  readonly recognisedAs: string | null;
}

/** What the analysing thread says. */
export type ThreadMessage =
  | { readonly kind: 'progress'; readonly share: number }
  | { readonly kind: 'outcome'; readonly outcome: AnalysisOutcome }
  | {
      readonly kind: 'refused';
      readonly code: DspErrorCode;
      readonly message: string;
      readonly details: DspErrorDetails;
    }
  | { readonly kind: 'crashed'; readonly message: string };
