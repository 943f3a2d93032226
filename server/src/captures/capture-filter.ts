import { searchPatterns } from '../common/search-words';
import type { CaptureSort, ListCapturesQuery } from './dto/list-captures.query';

/** What a list may be ordered by: the expression, its type for a cursor, and what a cursor's value looks like. */
export const SORT_EXPRESSIONS: Readonly<Record<CaptureSort, { sql: string; type: string; shape: RegExp }>> = {
  number: { sql: 'c.number', type: 'integer', shape: /^\d{1,9}$/ },
  uploadedAt: {
    sql: 'c.uploaded_at',
    type: 'timestamptz',
    shape: /^\d{4}-\d\d-\d\d \d\d:\d\d:\d\d(\.\d+)?[+-]\d\d(:\d\d)?$/,
  },
  fileName: { sql: 'c.file_name_key COLLATE "C"', type: 'text', shape: /^/ },
  sizeBytes: { sql: 'c.size_bytes', type: 'bigint', shape: /^\d{1,15}$/ },
  durationS: { sql: 'c.duration_s', type: 'double precision', shape: /^\d+(\.\d+)?(e[+-]?\d{1,2})?$/ },
  unit: { sql: 'c.unit_key COLLATE "C"', type: 'text', shape: /^/ },
  measure: { sql: 'c.measure COLLATE "C"', type: 'text', shape: /^/ },
};

/** A WHERE clause under construction: conditions and the values that their placeholders stand for. */
export class Conditions {
  readonly values: unknown[] = [];
  readonly #parts: string[] = [];

  /** Adds a condition; `?` in it becomes the placeholder of the value. */
  add(sql: string, ...values: unknown[]): void {
    let next = 0;
    this.#parts.push(sql.replace(/\?/g, () => `$${this.values.push(values[next++])}`));
  }

  get isEmpty(): boolean {
    return this.#parts.length === 0;
  }

  toString(): string {
    return this.isEmpty ? 'true' : this.#parts.join(' AND ');
  }
}

/** The filter of a capture list; `c` is the capture. */
export function captureConditions(query: ListCapturesQuery): Conditions {
  const where = new Conditions();
  for (const pattern of searchPatterns(query.q)) where.add('c.search LIKE ?', pattern);
  if (query.unsorted === true) where.add('c.unit_id IS NULL');
  if (query.unsorted === false) where.add('c.unit_id IS NOT NULL');
  if (query.hasWarnings === true) where.add('c.has_warnings');
  if (query.hasWarnings === false) where.add('NOT c.has_warnings');
  const { unitId, conditionId, rigId, measure, state, since, until } = query;
  if (unitId !== undefined) where.add('c.unit_id = ?', unitId);
  if (conditionId !== undefined) where.add('c.condition_id = ?', conditionId);
  if (rigId !== undefined) where.add('c.rig_id = ?', rigId);
  if (measure !== undefined) where.add('c.measure = ?', measure);
  if (state !== undefined) where.add('c.state = ?', state);
  if (since !== undefined) where.add('c.uploaded_at >= ?', since);
  if (until !== undefined) where.add('c.uploaded_at < ?', until);
  return where;
}
