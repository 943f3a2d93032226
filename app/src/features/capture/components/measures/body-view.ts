import type { Capture } from '@/lib/api-schema';
import type { ServedBody, ServedRecordDetail } from '../../api/record-queries';

/** What a measure's charts are drawn from: a record, or one part of a programme's. */
export interface BodyView {
  readonly capture: Capture;
  readonly detail: ServedRecordDetail;
  readonly body: ServedBody;
  /** 1, 2, 3 ... in a programme; null for a record of one measure. */
  readonly segment: number | null;
}
