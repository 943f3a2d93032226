/** Unit endings of keys, longest first where one ends in another. */
const UNIT_ENDINGS = [
  'Dbfs',
  'Dbtp',
  'Dbr',
  'Dbv',
  'Db',
  'Lufs',
  'Lu',
  'Percent',
  'Hz',
  'Ppm',
  'Ps',
  'Deg',
  'Bits',
  'Count',
  'Ratio',
  'S',
  'V',
] as const;
export type FigureUnit = (typeof UNIT_ENDINGS)[number];

const LOGARITHMIC = new Set<FigureUnit>(['Dbfs', 'Dbtp', 'Dbr', 'Dbv', 'Db', 'Lufs', 'Lu']);

/**
 * Reads the unit off a key, as every key of a record ends in it.
 *
 * @returns the ending, or null for a key without unit (a word such as `interchannelPolarity`)
 */
export function figureUnit(key: string): FigureUnit | null {
  return UNIT_ENDINGS.find((ending) => key.endsWith(ending)) ?? null;
}

/** Whether a key's unit is a logarithmic one, whose differences are in dB. */
export function isLogarithmicKey(key: string): boolean {
  const unit = figureUnit(key);
  return unit !== null && LOGARITHMIC.has(unit);
}
