import { partNumber, type AlignedPart } from '../shared/align-stimulus.js';

/** Tones evenly spaced in octaves. */
export interface ToneComb {
  readonly frequenciesHz: readonly number[];
}

/** Beyond this a comb is no comb of third-octaves. */
const MOST_TONES = 200;

/** The comb that a part's parameters describe; null where they describe none. */
export function combOfPart(part: Pick<AlignedPart, 'parameters'>): ToneComb | null {
  const lowest = partNumber(part, 'lowestHz');
  const perDecade = partNumber(part, 'tonesPerDecade');
  const count = partNumber(part, 'toneCount');
  if (lowest === null || perDecade === null || count === null) return null;
  if (!(lowest > 0 && perDecade > 0 && count >= 2 && count <= MOST_TONES)) return null;
  return {
    frequenciesHz: Array.from(
      { length: Math.floor(count) },
      (_, index) => lowest * 10 ** (index / perDecade),
    ),
  };
}

/** Exact third-octave mid-frequencies from 20 Hz up. @see IEC 61260-1:2014, base-ten system */
export function usualComb(highestHz: number): ToneComb {
  const frequenciesHz: number[] = [];
  for (let band = -17; 1000 * 10 ** (band / 10) <= highestHz; band++)
    frequenciesHz.push(1000 * 10 ** (band / 10));
  return { frequenciesHz };
}
