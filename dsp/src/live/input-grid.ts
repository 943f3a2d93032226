/** On which numbers an input's samples sit, told from the samples alone. */
export interface InputGrid {
  /**
   * `16-bit-asymmetric`: positive codes divided by 32,767 and negative ones by 32,768, which adds a second harmonic;
   * `unknown`: too few different values yet.
   */
  readonly kind: '16-bit' | '16-bit-asymmetric' | '24-bit' | 'float' | 'silent' | 'unknown';
  readonly bits: number | null;
  /** Noise of the grid over the whole band, undithered, against a full-scale sine; null where there is none to tell. */
  readonly floorDbfs: number | null;
}

export interface GridDetector {
  /** @param samples - the next ones of one channel */
  push(samples: ArrayLike<number>): void;
  read(): InputGrid;
}

const CODES_16 = 32_768;
const CODES_24 = 8_388_608;
/** Different values after which a coarse grid is no coincidence. */
const ENOUGH_VALUES = 64;
/** Samples after which nothing changes any more: ten seconds at 192 kHz. */
const MOST_SAMPLES = 2_000_000;
/** A float keeps 24 bits of a code divided by 32,767: relative rounding of two operations. */
const ROUNDING = 2 ** -22;

const floorOf = (bits: number): number => 20 * Math.log10((2 ** (1 - bits) / Math.sqrt(12)) * Math.SQRT2);

const GRIDS: readonly { kind: InputGrid['kind']; bits: number; holds: (x: number) => boolean }[] = [
  { kind: '16-bit', bits: 16, holds: (x) => Number.isInteger(x * CODES_16) },
  {
    kind: '16-bit-asymmetric',
    bits: 16,
    holds: (x) => (x < 0 ? Number.isInteger(x * CODES_16) : isNearWhole(x * (CODES_16 - 1))),
  },
  { kind: '24-bit', bits: 24, holds: (x) => Number.isInteger(x * CODES_24) },
];

function isNearWhole(value: number): boolean {
  return Math.abs(value - Math.round(value)) <= Math.max(1, value) * ROUNDING;
}

/**
 * Makes a detector of the grid that one input channel's samples sit on. A browser may give 16 bits whatever the
 * interface has, and nothing but the samples tells.
 *
 * The floor is LSB/√12 against 1/√2 (the mean square of a full-scale sine): -98.09 dBFS for 16 bits.
 */
export function createGridDetector(): GridDetector {
  const open = new Set(GRIDS);
  const values = new Set<number>();
  let seen = 0;
  let isSilent = true;
  return {
    push: (samples) => {
      for (let n = 0; n < samples.length && seen < MOST_SAMPLES; n++, seen++) {
        const x = samples[n];
        if (x === 0) continue;
        isSilent = false;
        if (values.size < ENOUGH_VALUES) values.add(x);
        for (const grid of open) if (!grid.holds(x)) open.delete(grid);
        if (open.size === 0) return;
      }
    },
    read: () => {
      const unknown = { bits: null, floorDbfs: null };
      if (isSilent) return { kind: 'silent', ...unknown };
      if (open.size > 0 && values.size < ENOUGH_VALUES) return { kind: 'unknown', ...unknown };
      const found = GRIDS.find((grid) => open.has(grid));
      if (found === undefined) return { kind: 'float', ...unknown };
      return { kind: found.kind, bits: found.bits, floorDbfs: floorOf(found.bits) };
    },
  };
}

/** Undoes the division of positive codes by 32,767, in place: a code is again the same step on both sides of zero. */
export function undoAsymmetricScaling(samples: Float32Array | Float64Array): void {
  for (let n = 0; n < samples.length; n++) {
    if (samples[n] > 0) samples[n] = Math.round(samples[n] * (CODES_16 - 1)) / CODES_16;
  }
}
