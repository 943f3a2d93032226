import { DspInputError } from '../errors.js';

/** Digits that a record keeps: engines may differ in the last bits of a sine or a logarithm, not in these. */
export const RECORD_DIGITS = 9;

/**
 * Rounds to nine significant digits, as every number of a record is.
 *
 * @param value - finite
 * @returns the nearest number that nine digits can write; -0 becomes 0
 * @throws DspInputError `OUT_OF_RANGE` for NaN and ±Infinity, which no record may hold
 */
export function roundToRecordDigits(value: number): number {
  if (!Number.isFinite(value))
    throw new DspInputError('OUT_OF_RANGE', `a record can't hold the number ${value}`);
  const rounded = Number(value.toPrecision(RECORD_DIGITS));
  return rounded === 0 ? 0 : rounded;
}

/**
 * Rounds every number in a tree of plain objects and arrays, keeping the order of keys.
 *
 * @param value - JSON-like; typed arrays are taken as arrays; not modified
 * @returns a new tree of plain objects and arrays; keys whose value is undefined are left out
 * @throws DspInputError `OUT_OF_RANGE` at the first number that isn't finite
 */
export function roundNumbers<T>(value: T): T {
  return roundAny(value) as T;
}

function roundAny(value: unknown): unknown {
  if (typeof value === 'number') return roundToRecordDigits(value);
  if (Array.isArray(value)) return value.map(roundAny);
  if (ArrayBuffer.isView(value))
    return Array.from(value as unknown as ArrayLike<number>, roundToRecordDigits);
  if (typeof value !== 'object' || value === null) return value;
  const rounded: Record<string, unknown> = {};
  for (const [key, entry] of Object.entries(value)) {
    if (entry !== undefined) rounded[key] = roundAny(entry);
  }
  return rounded;
}
