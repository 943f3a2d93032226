import type { ChannelResult } from '../../record/record.js';
import { numberIn, pointsOf } from '../record-view.js';

/** What a residual over the wave's phase says of its crests. */
export interface HeldWave {
  /** null where both halves are held alike. */
  readonly half: 'positive' | 'negative' | null;
  /** The residual against the tone, dB. */
  readonly depthDb: number;
}

/** Less than this against the tone is no clipping to speak of (common practice, no source). */
const LEAST_DB = -70;
const CREST_DEG = 50;
/** A crest holds so many times the residual's power of the other one … */
const ONE_SIDED = 2.5;
/** … and both crests together this share of all of it, or it is another shape. */
const LEAST_SHARE = 0.55;

/** Looks for a flattened crest in a tone's residual; null without one. */
export function heldHalfOfWave(result: ChannelResult): HeldWave | null {
  const residual = pointsOf(result, 'residual');
  const level = numberIn(result.figures, 'fundamentalLevelDbfs');
  if (residual.length < 32 || level === null) return null;
  const tonePower = 10 ** (level / 10) / 2;
  let [total, crest, trough, atCrest, atTrough] = [0, 0, 0, 0, 0];
  for (const { x, y } of residual) {
    total += y * y;
    if (Math.abs(x - 90) < CREST_DEG) crest += y * y;
    if (Math.abs(x - 270) < CREST_DEG) trough += y * y;
    if (Math.abs(x - 90) < CREST_DEG / 5) atCrest += y;
    if (Math.abs(x - 270) < CREST_DEG / 5) atTrough += y;
  }
  const depthDb = 10 * Math.log10(total / residual.length / tonePower);
  if (!(depthDb > LEAST_DB) || crest + trough < LEAST_SHARE * total) return null;
  // A crest that is held back lies below the tone: the residual there goes against the wave.
  const isCrestHeld = atCrest < 0;
  const isTroughHeld = atTrough > 0;
  if (crest > ONE_SIDED * trough && isCrestHeld) return { half: 'positive', depthDb };
  if (trough > ONE_SIDED * crest && isTroughHeld) return { half: 'negative', depthDb };
  return isCrestHeld && isTroughHeld && hasOddAlone(result) ? { half: null, depthDb } : null;
}

/** Clipping of both halves alike makes odd harmonics, the third strongest of them. */
function hasOddAlone({ harmonics }: ChannelResult): boolean {
  const level = (order: number): number =>
    harmonics.find((harmonic) => harmonic.order === order)?.levelDbr ?? -200;
  return level(3) > level(2) + 10 && level(5) > -120;
}
