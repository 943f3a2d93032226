import type { Capture } from '@/lib/api-schema';
import type { ServedBody } from '../../api/record-queries';

/** What a chart says that it is from. */
export type BodySubject = Pick<Capture, 'fileName' | 'unit' | 'condition' | 'rig'> & {
  /** In the archive; a take that isn't there yet has none. */
  readonly number: number | null;
};

/** What a measure's charts are drawn from: a record, or one part of a programme's. */
export interface BodyView {
  readonly capture: BodySubject;
  /** Of the record; without an id it isn't stored. */
  readonly detail: { readonly id: string | null; readonly createdAt: string };
  readonly body: ServedBody;
  /** 1, 2, 3 ... in a programme; null for a record of one measure. */
  readonly segment: number | null;
}
