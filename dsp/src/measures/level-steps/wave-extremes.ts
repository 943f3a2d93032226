import type { Lobe } from '../../spectrum/remove-lobes.js';
import type { ToneTrack } from '../shared/tone-tracker.js';

const POINTS = 256;
/** Harmonics beyond those that count draw a clipped top more sharply. */
const MORE_HARMONICS = 3;
/** The tone must stand this far above the noise a bin, power: then the wave is known to a part in a thousand. */
const CLEAR = 1e7;

/**
 * Gives the greatest and least value of a tone with its harmonics, noise averaged out: which half a stage holds back.
 *
 * @returns FS, the constant part left out; null where noise hides the shape
 */
export function extremesOf(
  track: ToneTrack,
  lobe: Lobe,
  highestHarmonic: number,
): { positive: number; negative: number } | null {
  if (!(lobe.power > CLEAR * lobe.noisePerBin)) return null;
  const count = Math.min(track.harmonics.length, MORE_HARMONICS * highestHarmonic);
  let [positive, negative] = [0, 0];
  for (let point = 0; point < POINTS; point++) {
    const phase = (2 * Math.PI * point) / POINTS;
    let value = track.amplitude * Math.sin(phase);
    for (let order = 2; order < count; order++) {
      const { re, im } = track.harmonics[order];
      value += re * Math.sin(order * phase) + im * Math.cos(order * phase);
    }
    positive = Math.max(positive, value);
    negative = Math.min(negative, value);
  }
  return { positive, negative };
}
