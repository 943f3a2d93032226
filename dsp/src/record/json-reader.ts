import { DspInputError, type DspErrorCode } from '../errors.js';

export type JsonObject = Readonly<Record<string, unknown>>;

/** Reads checked values out of foreign JSON; every fault is one typed error that names the place. */
export interface JsonReader {
  object(value: unknown, path: string): JsonObject;
  array(value: unknown, path: string): readonly unknown[];
  text(value: unknown, path: string): string;
  number(value: unknown, path: string): number;
  oneOf<T extends string>(value: unknown, allowed: readonly T[], path: string): T;
  fail(path: string, found: unknown, wanted: string): never;
}

/** @param code - the code of every error thrown */
export function createJsonReader(code: DspErrorCode, what: string): JsonReader {
  const fail = (path: string, found: unknown, wanted: string): never => {
    const shown = found === undefined ? 'nothing' : (JSON.stringify(found) ?? typeof found).slice(0, 60);
    throw new DspInputError(
      code,
      `the ${what} has ${shown} at ${path || 'its top'}, where ${wanted} is needed`,
      {
        found: shown,
      },
    );
  };
  return {
    fail,
    object: (value, path) =>
      typeof value === 'object' && value !== null && !Array.isArray(value)
        ? (value as JsonObject)
        : fail(path, value, 'an object'),
    array: (value, path) => (Array.isArray(value) ? (value as unknown[]) : fail(path, value, 'a list')),
    text: (value, path) => (typeof value === 'string' ? value : fail(path, value, 'a text')),
    number: (value, path) =>
      typeof value === 'number' && Number.isFinite(value) ? value : fail(path, value, 'a number'),
    oneOf: (value, allowed, path) =>
      allowed.find((entry) => entry === value) ?? fail(path, value, `one of ${allowed.join(', ')}`),
  };
}
