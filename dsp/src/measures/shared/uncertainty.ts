import type { FigureUncertainty } from '../../record/record.js';

const COVERAGE_FACTOR = 2;

export interface UncertaintyComponent {
  readonly name: string;
  /** Standard uncertainty in the figure's own unit. */
  readonly value: number;
}

/**
 * Combines independent components by the law of propagation.
 *
 * @param components - each in the figure's own unit; those that aren't finite are left out
 * @returns null without any component: nothing honest can be said then
 * @see JCGM 100:2008 (GUM), 5.1 and 6.2, coverage factor 2
 */
export function combineUncertainty(components: readonly UncertaintyComponent[]): FigureUncertainty | null {
  const known = components.filter(({ value }) => Number.isFinite(value) && value >= 0);
  if (known.length === 0) return null;
  const standard = Math.hypot(...known.map(({ value }) => value));
  return {
    standard,
    coverageFactor: COVERAGE_FACTOR,
    expanded: COVERAGE_FACTOR * standard,
    components: known,
  };
}

/** dB that a small relative change of power makes: 10 / ln 10. */
const DB_PER_RELATIVE_POWER = 10 / Math.LN10;

/** Standard uncertainty in dB of a power of known variance. */
export function powerDeviationDb(power: number, variance: number): number {
  return power > 0 ? (DB_PER_RELATIVE_POWER * Math.sqrt(variance)) / power : Number.NaN;
}

/** dB as a share of a percentage figure: a figure of p % known to u dB is known to this many percent. */
export function percentDeviation(percent: number, deviationDb: number): number {
  return (percent * deviationDb * Math.LN10) / 20;
}

/** Half-width of what the rig may have added, as a rectangular distribution. @see JCGM 100:2008, 4.3.7 */
export function rigDeviation(value: number, low: number | null, high: number | null): number | null {
  const reach = Math.max(
    low === null ? 0 : Math.abs(value - low),
    high === null ? 0 : Math.abs(high - value),
  );
  return reach > 0 ? reach / Math.sqrt(3) : null;
}
