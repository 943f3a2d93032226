import { isLogarithmicKey } from './figure-unit.js';
import type { BenchRecord } from './record.js';
import { RECORD_DIGITS, roundNumbers } from './round-numbers.js';

/** A place in which two records differ. */
export interface RecordDifference {
  /** Keys and indices from the top, as `channels.0.figures.thdDb`. */
  readonly path: string;
  /** undefined: not there. */
  readonly stored: unknown;
  readonly computed: unknown;
}

const TOLERANCE_DB = 1e-6;
const TOLERANCE_RELATIVE = 1e-9;
/** Traces reach far below any figure, where an engine's last bit shows. */
const TRACE_TOLERANCE = 1e-3;

/**
 * Compares a stored record with the same analysis done again.
 *
 * Numbers agree within 1e-6 dB (logarithmic units) or 1e-9 relative, or when they are neighbours among the numbers of
 * nine digits. Sentences are not compared, as their wording may be improved; codes are. Traces are compared when both
 * records hold them in equal length.
 *
 * @param stored - as read from JSON; not modified
 * @param computed - not modified
 * @returns every place that differs, in the order of the stored record's keys; empty when the two agree
 */
export function compareRecords(stored: BenchRecord, computed: BenchRecord): RecordDifference[] {
  const differences: RecordDifference[] = [];
  compareAny(roundNumbers(stored), roundNumbers(computed), [], differences);
  return differences;
}

/** Keys whose values aren't evidence: wording, and the version that the caller reports apart. */
const NOT_COMPARED = new Set(['message', 'summary', 'confirmBy', 'dspVersion']);

function compareAny(
  stored: unknown,
  computed: unknown,
  path: readonly string[],
  found: RecordDifference[],
): void {
  const key = path[path.length - 1] ?? '';
  if (NOT_COMPARED.has(key)) return;
  if (key === 'traces') return compareTraces(stored, computed, path, found);
  if (isTree(stored) && isTree(computed)) {
    for (const name of new Set([...Object.keys(stored), ...Object.keys(computed)])) {
      compareAny(stored[name], computed[name], [...path, name], found);
    }
    return;
  }
  if (typeof stored === 'number' && typeof computed === 'number') {
    if (agree(stored, computed, unitKey(path))) return;
  } else if (Object.is(stored, computed)) return;
  found.push({ path: path.join('.'), stored, computed });
}

function compareTraces(
  stored: unknown,
  computed: unknown,
  path: readonly string[],
  found: RecordDifference[],
): void {
  if (!isTree(stored) || !isTree(computed)) return;
  for (const name of Object.keys(stored)) {
    const one = stored[name];
    const other = computed[name];
    if (!isTree(one) || !isTree(other) || !Array.isArray(one['y']) || !Array.isArray(other['y'])) continue;
    const [y, again] = [one['y'] as number[], other['y'] as number[]];
    if (y.length !== again.length) continue;
    const scale = String(one['yUnit']).startsWith('dB')
      ? 1
      : y.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
    const at = y.findIndex((value, index) => Math.abs(value - again[index]) > TRACE_TOLERANCE * scale);
    if (at >= 0) found.push({ path: [...path, name, 'y', at].join('.'), stored: y[at], computed: again[at] });
  }
}

/** The key that carries the unit: under `limits` and `uncertainty` that of the figure above, not `floor` or `low`. */
function unitKey(path: readonly string[]): string {
  const parent = path.findIndex((key) => key === 'limits' || key === 'uncertainty');
  return (parent >= 0 ? path[parent + 1] : path[path.length - 1]) ?? '';
}

function agree(stored: number, computed: number, key: string): boolean {
  const difference = Math.abs(stored - computed);
  if (difference === 0) return true;
  const size = Math.max(Math.abs(stored), Math.abs(computed));
  const lastDigit = 10 ** (Math.floor(Math.log10(size)) + 1 - RECORD_DIGITS);
  const slack = 1 + 1e-6; // the differences of rounded decimals are themselves not exact in binary
  const tolerance = isLogarithmicKey(key) ? TOLERANCE_DB : TOLERANCE_RELATIVE * size;
  return difference <= Math.max(tolerance, lastDigit) * slack;
}

function isTree(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null;
}
