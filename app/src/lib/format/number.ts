/** The en dash that stands for what was not measured. */
export const NOT_MEASURED = '\u2013';
export const MINUS = '\u2212';
/** Narrow no-break space, between groups of three digits. */
export const THIN_SPACE = '\u202f';
/** Between a number and its unit in running text: never broken. */
export const NO_BREAK_SPACE = '\u00a0';

export interface NumberFormat {
  /** Digits after the point; a negative count rounds to tens, hundreds … */
  readonly decimals: number;
  /** Print + before what is greater than zero. */
  readonly isSigned?: boolean;
}

/** Groups of three from the point leftwards; four digits are grouped too, so that columns agree. */
function groupDigits(integer: string): string {
  return integer.replace(/\B(?=(\d{3})+$)/g, THIN_SPACE);
}

/** Rounds half away from zero, as people do on paper, and prints with U+2212 and U+202F. Never "-0". */
export function formatNumber(value: number, { decimals, isSigned = false }: NumberFormat): string {
  const size = Math.abs(value);
  const fixed = decimals >= 0 ? toFixedHalfUp(size, decimals) : String(roundToPowerOfTen(size, -decimals));
  const [integer = '0', fraction] = fixed.split('.');
  const isZero = !/[1-9]/.test(fixed);
  const sign = isZero ? '' : value < 0 ? MINUS : isSigned ? '+' : '';
  return sign + groupDigits(integer) + (fraction === undefined ? '' : `.${fraction}`);
}

/** Rounds the decimal form: 1.005 prints as 1.01 at two decimals although its binary form lies below. */
function toFixedHalfUp(size: number, decimals: number): string {
  const plain = String(Number(size.toPrecision(15)));
  const [mantissa = '0', exponent = '0'] = plain.split('e');
  const shifted = Number(`${mantissa}e${Number(exponent) + decimals}`);
  return (Math.round(shifted) / 10 ** decimals).toFixed(decimals);
}

function roundToPowerOfTen(size: number, power: number): number {
  const unit = 10 ** power;
  return Math.round(size / unit) * unit;
}

/** Decimals that leave `digits` significant digits of a value; zero takes `digits - 1`. */
export function decimalsForSignificant(value: number, digits: number): number {
  if (value === 0) return Math.max(0, digits - 1);
  const exponent = Math.floor(Math.log10(Math.abs(value)));
  // 9.96 to two digits is 10: rounding may add a digit before the point.
  const rounded = Math.abs(value) / 10 ** (exponent - digits + 1);
  return digits - 1 - exponent - (Math.round(rounded) >= 10 ** digits ? 1 : 0);
}
