import type { MeasureId } from '@benchlark/dsp';
import type { CaptureListQuery } from '@/lib/api-schema';
import { isMeasure } from '@/lib/capture-words';

export const SORT_COLUMNS = [
  'uploadedAt',
  'number',
  'fileName',
  'sizeBytes',
  'durationS',
  'unit',
  'measure',
] as const;
export type SortColumn = (typeof SORT_COLUMNS)[number];

const STATES = ['queued', 'analysing', 'done', 'failed', 'cancelled'] as const;
const DAY = /^\d{4}-\d{2}-\d{2}$/;

/** What the archive shows. Everything is in the page's address, so that a view can be sent to somebody. */
export interface ArchiveFilter {
  readonly unitId: string | null;
  /** Only what is filed under no unit; goes before `unitId`. */
  readonly isUnsorted: boolean;
  readonly conditionId: string | null;
  readonly rigId: string | null;
  readonly measure: MeasureId | null;
  readonly state: (typeof STATES)[number] | null;
  readonly warnings: 'with' | 'without' | null;
  /** First and last day shown, as YYYY-MM-DD in the reader's own time zone. */
  readonly since: string | null;
  readonly until: string | null;
  readonly words: string;
  readonly sort: SortColumn;
  readonly order: 'asc' | 'desc';
}

export const NO_FILTER: ArchiveFilter = {
  unitId: null,
  isUnsorted: false,
  conditionId: null,
  rigId: null,
  measure: null,
  state: null,
  warnings: null,
  since: null,
  until: null,
  words: '',
  sort: 'uploadedAt',
  order: 'desc',
};

export const UNSORTED = 'none';

/** Reads the address; what it does not understand counts as not asked for. */
export function readFilter(params: URLSearchParams): ArchiveFilter {
  const unit = params.get('unit');
  const measure = params.get('measure');
  return {
    unitId: unit === UNSORTED ? null : unit,
    isUnsorted: unit === UNSORTED,
    conditionId: params.get('condition'),
    rigId: params.get('rig'),
    measure: isMeasure(measure) ? measure : null,
    state: oneOf(STATES, params.get('state')),
    warnings: oneOf(['with', 'without'] as const, params.get('warnings')),
    since: day(params.get('since')),
    until: day(params.get('until')),
    words: params.get('q') ?? '',
    sort: oneOf(SORT_COLUMNS, params.get('sort')) ?? NO_FILTER.sort,
    order: oneOf(['asc', 'desc'] as const, params.get('order')) ?? NO_FILTER.order,
  };
}

/** Writes only what differs from the plain archive, and keeps what else stands in the address. */
export function writeFilter(filter: ArchiveFilter, base: URLSearchParams): URLSearchParams {
  const params = new URLSearchParams(base);
  const put = (name: string, value: string | null, plain: string | null = null) => {
    if (value === null || value === '' || value === plain) params.delete(name);
    else params.set(name, value);
  };
  put('unit', filter.isUnsorted ? UNSORTED : filter.unitId);
  put('condition', filter.conditionId);
  put('rig', filter.rigId);
  put('measure', filter.measure);
  put('state', filter.state);
  put('warnings', filter.warnings);
  put('since', filter.since);
  put('until', filter.until);
  put('q', filter.words);
  put('sort', filter.sort, NO_FILTER.sort);
  put('order', filter.order, NO_FILTER.order);
  return params;
}

/** The question to the server. A day begins and ends at the reader's own midnight. */
export function toQuery(filter: ArchiveFilter): CaptureListQuery {
  const query: CaptureListQuery = { sort: filter.sort, order: filter.order };
  if (filter.words.trim() !== '') query.q = filter.words.trim();
  if (filter.isUnsorted) query.unsorted = true;
  else if (filter.unitId !== null) query.unitId = filter.unitId;
  if (filter.conditionId !== null) query.conditionId = filter.conditionId;
  if (filter.rigId !== null) query.rigId = filter.rigId;
  if (filter.measure !== null) query.measure = filter.measure;
  if (filter.state !== null) query.state = filter.state;
  if (filter.warnings !== null) query.hasWarnings = filter.warnings === 'with';
  if (filter.since !== null) query.since = midnight(filter.since, 0);
  if (filter.until !== null) query.until = midnight(filter.until, 1);
  return query;
}

/** Whether anything narrows the view: only then is it worth offering to widen it. */
export function isNarrowed(filter: ArchiveFilter): boolean {
  return (
    writeFilter({ ...filter, sort: NO_FILTER.sort, order: NO_FILTER.order }, new URLSearchParams()).size > 0
  );
}

/** The chosen rows, by capture number: short, and readable in an address. */
export function readChosen(params: URLSearchParams): ReadonlySet<number> {
  const numbers = (params.get('chosen') ?? '').split(',').map(Number);
  return new Set(numbers.filter((number) => Number.isInteger(number) && number > 0));
}

export function writeChosen(chosen: ReadonlySet<number>, base: URLSearchParams): URLSearchParams {
  const params = new URLSearchParams(base);
  if (chosen.size === 0) params.delete('chosen');
  else params.set('chosen', [...chosen].sort((a, b) => a - b).join(','));
  return params;
}

function oneOf<const T extends readonly string[]>(values: T, value: string | null): T[number] | null {
  return values.find((candidate) => candidate === value) ?? null;
}

function day(value: string | null): string | null {
  return value !== null && DAY.test(value) && !Number.isNaN(Date.parse(value)) ? value : null;
}

function midnight(isoDay: string, daysLater: number): string {
  const [year = 0, month = 1, dayOfMonth = 1] = isoDay.split('-').map(Number);
  return new Date(year, month - 1, dayOfMonth + daysLater).toISOString();
}
