import type { SampleSource } from '../../source/sample-source.js';
import { estimateTone } from '../../tone/estimate-tone.js';
import { fitSine } from '../../tone/fit-sine.js';
import { partNumber, type AlignedPart } from '../shared/align-stimulus.js';

/** A clock that differs more from the file's rate than this is another file's. */
const FURTHEST = 500e-6;
const LOOK_S = 1.5;
/** Beside the edges, so that a place that is known only roughly still lies inside the part. */
const MARGIN_S = 0.15;

/**
 * Reads the player's clock over the recorder's from a part that holds one loud tone.
 *
 * @returns null where the part's middle isn't in the recording or holds no such tone
 */
export async function clockFromTone(source: SampleSource, part: AlignedPart): Promise<number | null> {
  const frequencyHz = partNumber(part, 'frequencyHz');
  if (frequencyHz === null) return null;
  const { sampleRateHz, frameCount } = source;
  const lengthS = Math.min(LOOK_S, part.toS - part.fromS - 2 * MARGIN_S);
  const fromFrame = Math.round(((part.fromS + part.toS - lengthS) / 2) * sampleRateHz);
  const count = Math.round(lengthS * sampleRateHz);
  if (fromFrame < 0 || fromFrame + count > frameCount || count < 1024) return null;
  const channels = await source.read(fromFrame, count);
  for (const samples of channels) {
    const estimate = estimateTone(samples, sampleRateHz, {
      lowHz: frequencyHz * (1 - 2 * FURTHEST) - 2,
      highHz: frequencyHz * (1 + 2 * FURTHEST) + 2,
    });
    if (estimate === null || !(estimate.power > 0)) continue;
    const fit = fitSine(samples, sampleRateHz, estimate.frequencyHz);
    const speed = fit.frequencyHz / frequencyHz;
    const rest =
      samples.reduce((sum, x) => sum + x * x, 0) / samples.length - fit.amplitude ** 2 / 2 - fit.offset ** 2;
    // Most of what is there must be the tone.
    if (Math.abs(speed - 1) <= FURTHEST && rest < fit.amplitude ** 2 / 4) return speed;
  }
  return null;
}
