/** How a figure's value stands to the level of what is left beside the tone, in dB. */
export interface FigureScale {
  readonly key: string;
  /** Noise adds as power; a product adds as a vector, in any phase. */
  readonly nature: 'noise' | 'product';
  toDb(value: number): number;
  fromDb(levelDb: number): number;
}

const identity = (value: number): number => value;
const negated = (value: number): number => -value;

/** A level or ratio in dB that falls as the unit gets better. */
export function levelScale(key: string, nature: FigureScale['nature']): FigureScale {
  return { key, nature, toDb: identity, fromDb: identity };
}

/** A ratio in dB that rises as the unit gets better, as SINAD does. */
export function inverseScale(key: string, nature: FigureScale['nature']): FigureScale {
  return { key, nature, toDb: negated, fromDb: negated };
}

export function percentScale(key: string, nature: FigureScale['nature']): FigureScale {
  return {
    key,
    nature,
    toDb: (value) => 20 * Math.log10(value / 100),
    fromDb: (levelDb) => 100 * 10 ** (levelDb / 20),
  };
}

/** Effective bits: SINAD by IEEE Std 1241's straight line (constants computed: 10 lg 1.5 and 20 lg 2). */
export function bitsScale(key: string): FigureScale {
  const offset = 10 * Math.log10(1.5);
  const perBit = 20 * Math.log10(2);
  return {
    key,
    nature: 'noise',
    toDb: (bits) => -(bits * perBit + offset),
    fromDb: (levelDb) => (-levelDb - offset) / perBit,
  };
}
