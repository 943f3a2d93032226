import type { FigureLimit, FigureValue } from '@benchlark/dsp';
import { describeFigure, type FigureKind } from './figures';
import { formatNumber } from './format/number';
import { withUnit } from './format/quantity';

/** What a figure is worth, as the contract draws the limits. */
export type Worth = 'clear' | 'near' | 'at' | 'floor-unknown' | 'not-measured';

export const WORTH_WORDS: Record<Worth, string> = {
  clear: 'clear of the rig',
  near: 'near the rig\u2019s floor',
  at: 'at the rig\u2019s floor: the unit may be better',
  'floor-unknown': 'floor not known',
  'not-measured': 'not measured',
};

/** Margin in dB below which the rig decides the figure. */
export const AT_FLOOR_BELOW_DB = 3;
/** Margin in dB below which the rig has a part in the figure, by its kind. */
const NEAR_FLOOR_BELOW_DB: Record<FigureKind, number> = { signal: 20, noise: 10, product: 20, plain: 20 };

export interface WorthOfFigure {
  readonly worth: Worth;
  /** The distance or the reason, for the tooltip. */
  readonly why: string | null;
}

const LIMITER_WORDS: Record<FigureLimit['by'], string> = {
  rig: 'what the rig alone gives',
  noise: 'the noise',
  quantisation: 'the quantisation of the recording',
  length: 'what so short a recording allows',
  overload: 'the overload of the input',
};

/** What a figure is worth; null for figures that no floor bears on (a frequency, a crest factor). */
export function worthOfFigure(
  key: string,
  value: FigureValue | undefined,
  limit: FigureLimit | null | undefined,
): WorthOfFigure | null {
  const { kind } = describeFigure(key);
  const isMissing = value === null || value === undefined;
  if (isMissing && typeof limit?.below === 'number') {
    return { worth: 'at', why: `held up by ${LIMITER_WORDS[limit.by]}, so printed as a bound` };
  }
  if (isMissing) return { worth: 'not-measured', why: null };
  if (typeof value === 'string' || kind === 'plain') return null;
  if (!limit || limit.marginDb === null) {
    return { worth: 'floor-unknown', why: 'no baseline of the rig was used for this record' };
  }
  const distance = withUnit(formatNumber(Math.abs(limit.marginDb), { decimals: 0 }), 'dB');
  const side = limit.marginDb < 0 ? 'below' : 'above';
  const why = `${distance} ${side} ${LIMITER_WORDS[limit.by]}`;
  if (limit.marginDb < AT_FLOOR_BELOW_DB) return { worth: 'at', why };
  return { worth: limit.marginDb < NEAR_FLOOR_BELOW_DB[kind] ? 'near' : 'clear', why };
}
