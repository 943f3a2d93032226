import { z } from 'zod';

interface Limits {
  least: number;
  most: number;
}

/** Reads a number as people write it: a comma for a point, a typographic minus, spaces between thousands. */
export function readDecimal(text: string): number | null {
  const plain = text
    .replace(/[\s\u202f\u00a0]/g, '')
    .replace('\u2212', '-')
    .replace(',', '.');
  return /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(plain) ? Number(plain) : null;
}

const isWithin = (value: number | null, { least, most }: Limits): value is number =>
  value !== null && value >= least && value <= most;

/** A number written into a field of text. */
export function decimal(limits: Limits, message: string) {
  return z
    .string()
    .refine((text) => isWithin(readDecimal(text), limits), message)
    .transform((text) => Number(readDecimal(text)));
}

/** The same, or nothing for none. */
export function optionalDecimal(limits: Limits, message: string) {
  return z
    .string()
    .refine((text) => text.trim() === '' || isWithin(readDecimal(text), limits), message)
    .transform((text) => readDecimal(text));
}
