import type { FigureLimit, FigureUncertainty, FigureValue } from '@benchlark/dsp';
import { describeFigure } from '../figures';
import { decimalsFor } from './digits';
import { formatNumber, NOT_MEASURED } from './number';
import { withUnit } from './quantity';

export interface FigureText {
  /** Before the point, sign included; a dash when nothing was measured. */
  readonly integer: string;
  /** The point and what follows, or nothing. */
  readonly fraction: string;
  readonly unit: string;
  /** "±0.05", or null where there is none to give. */
  readonly plusMinus: string | null;
  /** Set when the rig allows a bound only. */
  readonly bound: 'at-most' | 'at-least' | null;
  /** The whole in words a screen reader says well. */
  readonly spoken: string;
}

export interface FigureParts {
  readonly value: FigureValue | undefined;
  readonly limit?: FigureLimit | null;
  readonly uncertainty?: Pick<FigureUncertainty, 'expanded'> | null;
}

const BOUND_WORDS = { 'at-most': 'at most', 'at-least': 'at least' } as const;

/** A figure as people read it: digits as many as its uncertainty allows. */
export function formatFigure(key: string, { value, limit, uncertainty }: FigureParts): FigureText {
  const { unit, digits, scale = 1, bound: boundSide } = describeFigure(key);
  if (typeof value === 'string') {
    return { integer: value, fraction: '', unit: '', plusMinus: null, bound: null, spoken: value };
  }
  const isBound = (value === null || value === undefined) && typeof limit?.below === 'number';
  const stored = isBound ? limit.below : value;
  if (stored === null || stored === undefined) {
    return {
      integer: NOT_MEASURED,
      fraction: '',
      unit,
      plusMinus: null,
      bound: null,
      spoken: 'not measured',
    };
  }
  const number = stored * scale;
  const expanded = isBound || !uncertainty ? null : uncertainty.expanded * scale;
  const decimals = decimalsFor(number, expanded, digits);
  const text = formatNumber(number, { decimals });
  const [integer = text, fraction] = text.split('.');
  const plusMinus = expanded !== null && expanded > 0 ? `±${formatUncertainty(expanded, decimals)}` : null;
  const bound = isBound ? boundSide : null;
  const spoken = [bound && BOUND_WORDS[bound], withUnit(text, unit), plusMinus && withUnit(plusMinus, unit)];
  return {
    integer,
    fraction: fraction === undefined ? '' : `.${fraction}`,
    unit,
    plusMinus,
    bound,
    spoken: spoken.filter(Boolean).join(' '),
  };
}

/** Rounded to the value's last digit, but never down to nothing. */
function formatUncertainty(expanded: number, decimals: number): string {
  const step = 10 ** -decimals;
  return formatNumber(Math.max(expanded, step), { decimals });
}

/** One line for running text and lists: "−108.8 dB", "at most −114.3 dBFS", "not measured". */
export function formatFigureLine(key: string, parts: FigureParts): string {
  const { integer, fraction, unit, bound, spoken } = formatFigure(key, parts);
  if (integer === NOT_MEASURED) return spoken;
  const number = withUnit(integer + fraction, unit);
  return bound ? `${BOUND_WORDS[bound]} ${number}` : number;
}
