import { figureUnit, type FigureUnit, type FigureUncertainty, type FigureValue } from '@benchlark/dsp';

/** How the trade writes the words that keys spell in lower case. */
const TRADE_WORDS: readonly (readonly [RegExp, string])[] = [
  [/\bthd plus noise\b/, 'THD+N'],
  [/\bthd\b/, 'THD'],
  [/\bsnr\b/, 'SNR'],
  [/\bsinad\b/, 'SINAD'],
  [/\benob\b/, 'ENOB'],
  [/\bdc\b/, 'DC'],
  [/ a weighted\b/, ', A-weighted'],
  [/ itu468 rms\b/, ', CCIR-RMS'],
];

/** `thdPlusNoiseDb` becomes "THD+N": so a new measure's figures need no list here. */
export function figureLabel(key: string): string {
  const bare = key.slice(0, key.length - (figureUnit(key)?.length ?? 0));
  const words = bare.replaceAll(/([A-Z])/g, (letter) => ` ${letter.toLowerCase()}`).trim();
  const text = TRADE_WORDS.reduce((soFar, [pattern, word]) => soFar.replace(pattern, word), words);
  return text.charAt(0).toUpperCase() + text.slice(1);
}

/** Beyond these, digits say more about the arithmetic than about the unit. */
const MOST_DECIMALS: Partial<Record<FigureUnit, number>> = { Percent: 8, Hz: 4, S: 6, V: 6 };
const MOST_DECIMALS_DB = 3;

/** As many decimals as the expanded uncertainty is worth (two digits of it when it begins with a one). */
function decimalsFor(key: string, value: number, expanded: number | undefined): number {
  const unit = figureUnit(key);
  const most = (unit && MOST_DECIMALS[unit]) ?? MOST_DECIMALS_DB;
  if (expanded !== undefined && expanded > 0) {
    const exponent = Math.floor(Math.log10(expanded));
    const digits = expanded / 10 ** exponent < 2 ? 1 : 0;
    return Math.min(most, Math.max(0, digits - exponent));
  }
  if (unit !== 'Percent' || value === 0) return Math.min(most, 2);
  return Math.min(most, Math.max(0, 1 - Math.floor(Math.log10(Math.abs(value)))));
}

function expandedText(expanded: number, decimals: number): string {
  const smallest = 10 ** -decimals;
  return expanded < smallest / 2 ? `±<${smallest.toFixed(decimals)}` : `±${expanded.toFixed(decimals)}`;
}

export function numberText(key: string, value: number): string {
  return value.toFixed(decimalsFor(key, value, undefined));
}

export function figureText(
  key: string,
  value: FigureValue | undefined,
  uncertainty: FigureUncertainty | undefined,
): { readonly value: string; readonly expanded: string } {
  if (value === null || value === undefined) return { value: '-', expanded: '' };
  if (typeof value === 'string') return { value, expanded: '' };
  if (uncertainty === undefined) return { value: numberText(key, value), expanded: '' };
  const decimals = decimalsFor(key, value, uncertainty.expanded);
  return { value: value.toFixed(decimals), expanded: expandedText(uncertainty.expanded, decimals) };
}
