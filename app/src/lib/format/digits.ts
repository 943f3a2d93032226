import { decimalsForSignificant } from './number';

/**
 * Decimals to which an expanded uncertainty is written, after the rounding rule of the Particle Data Group's
 * Review of Particle Physics (introduction, "Rounding"): three leading digits 100 to 354 keep two digits, 355 to
 * 949 one, 950 to 999 round up to 1000 and keep two. GUM (JCGM 100:2008, 7.2.6) asks for two at most.
 */
export function decimalsForUncertainty(expanded: number): number {
  const exponent = Math.floor(Math.log10(expanded));
  const leading = Math.round((expanded / 10 ** exponent) * 100);
  // 0.95 and more is written 1.0, which is two digits at the same decimal as one digit of 0.94.
  return (leading <= 354 ? 1 : 0) - exponent;
}

export interface DigitRule {
  /** Decimals when no uncertainty is known. */
  readonly decimals?: number;
  /** Significant digits instead, for figures that span decades (percent). */
  readonly significant?: number;
  /** Never more decimals than these, however small the uncertainty. */
  readonly mostDecimals?: number;
  /** Nor more significant digits than these. */
  readonly mostSignificant?: number;
}

/** Decimals that a value is worth: its uncertainty's last digit, else the figure's own rule. */
export function decimalsFor(value: number, expanded: number | null | undefined, rule: DigitRule): number {
  const most = Math.min(
    rule.mostDecimals ?? 9,
    rule.mostSignificant === undefined ? 9 : decimalsForSignificant(value, rule.mostSignificant),
  );
  if (expanded !== null && expanded !== undefined && expanded > 0 && Number.isFinite(expanded)) {
    return Math.min(most, decimalsForUncertainty(expanded));
  }
  if (rule.significant !== undefined) return Math.min(most, decimalsForSignificant(value, rule.significant));
  return Math.min(most, rule.decimals ?? 1);
}

/** Decimals that tell two values a step apart from each other: 1 for 0.37, 0 for 2. */
export function decimalsForStep(step: number): number {
  if (!(step > 0) || !Number.isFinite(step)) return 0;
  return Math.min(6, Math.max(0, -Math.floor(Math.log10(step))));
}
