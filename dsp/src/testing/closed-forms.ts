/** Fourier coefficients of a bent unit tone, derived from its defining integrals; each harmonic's peak, signed. */
export interface BentTone {
  readonly constant: number;
  /** harmonics[0] is the fundamental. */
  readonly harmonics: readonly number[];
  /** Mean square of the whole wave, the constant part included. */
  readonly meanSquare: number;
}

function listOrders(count: number, of: (order: number) => number): number[] {
  return Array.from({ length: count }, (_, index) => of(index + 1));
}

/** Both halves of sin u clipped at ±level, 0 < level < 1; sine coefficients. */
export function clipBothHalves(level: number, count: number): BentTone {
  const t = Math.asin(level);
  const harmonics = listOrders(count, (n) => {
    if (n === 1) return (2 / Math.PI) * (t + level * Math.cos(t));
    if (n % 2 === 0) return 0;
    const difference = Math.sin((n - 1) * t) / (2 * (n - 1)) - Math.sin((n + 1) * t) / (2 * (n + 1));
    return (4 / Math.PI) * (difference + (level * Math.cos(n * t)) / n);
  });
  const meanSquare = (2 / Math.PI) * (t / 2 - Math.sin(2 * t) / 4 + level * level * (Math.PI / 2 - t));
  return { constant: 0, harmonics, meanSquare };
}

/** The positive half of cos u clipped at level, 0 < level < 1; cosine coefficients. */
export function clipPositiveHalf(level: number, count: number): BentTone {
  const p = Math.acos(level);
  const harmonics = listOrders(count, (n) => {
    if (n === 1) return 1 - (p - level * Math.sin(p)) / Math.PI;
    const sum = Math.sin((n - 1) * p) / (2 * (n - 1)) + Math.sin((n + 1) * p) / (2 * (n + 1));
    return (-2 / Math.PI) * (sum - (level * Math.sin(n * p)) / n);
  });
  const meanSquare = 0.5 - (p + Math.sin(p) * Math.cos(p)) / (2 * Math.PI) + (p * level * level) / Math.PI;
  return { constant: -(Math.sin(p) - level * p) / Math.PI, harmonics, meanSquare };
}

/** Crossover: sin u less its part between ±width; sine coefficients. */
export function deadZone(width: number, count: number): Omit<BentTone, 'meanSquare'> {
  const clipped = clipBothHalves(width, count);
  return {
    constant: 0,
    harmonics: clipped.harmonics.map((value, index) => (index === 0 ? 1 - value : -value)),
  };
}

/** A cos u through x + a2 x² + a3 x³ + a4 x⁴ + a5 x⁵; harmonics 1 to 5, cosine coefficients. */
export function bendCosine(
  amplitude: number,
  [a2 = 0, a3 = 0, a4 = 0, a5 = 0]: readonly number[],
): Omit<BentTone, 'meanSquare'> {
  const a = amplitude;
  return {
    constant: (a2 * a ** 2) / 2 + (3 * a4 * a ** 4) / 8,
    harmonics: [
      a + 0.75 * a3 * a ** 3 + 0.625 * a5 * a ** 5,
      (a2 * a ** 2) / 2 + (a4 * a ** 4) / 2,
      (a3 * a ** 3) / 4 + (5 * a5 * a ** 5) / 16,
      (a4 * a ** 4) / 8,
      (a5 * a ** 5) / 16,
    ],
  };
}

/** Total harmonic distortion over all harmonics, against the fundamental. */
export function thdOverAll({ constant, harmonics, meanSquare }: BentTone): number {
  return Math.sqrt(2 * (meanSquare - constant * constant) - harmonics[0] ** 2) / Math.abs(harmonics[0]);
}
