import type { TonePair } from './pair-products.js';

/** Tones further apart than this are told by how the low one modulates the high one. */
const FAR_APART = 4;

/** Tells how two tones are read; what is known of the stimulus comes first. */
export function pairKind(amplitudeRatio: number | null, lowHz: number, highHz: number): TonePair['kind'] {
  if (amplitudeRatio !== null) return amplitudeRatio > 1 ? 'modulation' : 'difference';
  return highHz / lowHz > FAR_APART ? 'modulation' : 'difference';
}

/** Share of the lower of the two rates up to which products count. */
const USABLE_SHARE = 0.45;

/** Up to which frequency products are taken. */
export function highestProductHz(sampleRateHz: number, fileRateHz: number | null): number {
  return USABLE_SHARE * Math.min(sampleRateHz, fileRateHz ?? Infinity);
}
