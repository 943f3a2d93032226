import type { MeasureId } from '../../record/record.js';

/** What a recording was taken for by its signal. */
export interface SignalRecognition {
  readonly measure: MeasureId;
  /** What was seen, as the end of a sentence. */
  readonly why: string;
}
