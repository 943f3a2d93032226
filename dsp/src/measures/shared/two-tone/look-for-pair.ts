import { createRealFft } from '../../../spectrum/create-real-fft.js';
import type { SampleSource } from '../../../source/sample-source.js';
import { createWindow } from '../../../window/create-window.js';
import type { FrameRange } from '../stream-frames.js';
import { findStrongestLine } from '../find-line.js';
import { TONE_PROMINENCE, type ToneSearch } from '../tone-tracker.js';

export interface PairSight {
  readonly low: ToneSearch;
  readonly high: ToneSearch;
  readonly lowHz: number;
  readonly highHz: number;
}

const LOOK_FRAMES = 65_536;
/** As far as a tone is looked for beside its place: a share of it, but at least so many bins. */
const NEAR_SHARE = 0.01;
const NEAR_BINS = 1.5;
const LOWEST_HZ = 10;
const HIGHEST_SHARE = 0.49;
/** The weaker tone of a pair is no weaker than this against the stronger, power: what is lower is a product. */
const WEAKEST = 1e-3;
const WINDOW = 'blackman-harris-7';

/**
 * Looks for two tones in the middle of a segment: where they should be, else the two strongest lines.
 *
 * @param nominal - both tones as they should lie in the recording, Hz; null for anywhere
 * @returns one entry a channel, null where there aren't two
 */
export async function lookForPairs(
  source: SampleSource,
  range: FrameRange,
  nominal: { readonly lowHz: number; readonly highHz: number } | null,
): Promise<(PairSight | null)[]> {
  const length = Math.min(LOOK_FRAMES, 2 ** Math.floor(Math.log2(range.to - range.from)));
  const from = range.from + Math.floor((range.to - range.from - length) / 2);
  const block = await source.read(from, length);
  const fft = createRealFft(length);
  const window = createWindow(WINDOW, length);
  const re = new Float64Array(length / 2 + 1);
  const im = new Float64Array(length / 2 + 1);
  const binWidthHz = source.sampleRateHz / length;
  const half = window.exclusionHalfWidthBins;
  return block.map((samples) => {
    const mean = samples.reduce((sum, x) => sum + x, 0) / length;
    fft.transform(
      samples.map((x, n) => (x - mean) * window.samples[n]),
      re,
      im,
    );
    const power = re.map((x, k) => x * x + im[k] * im[k]);
    const look = (lowHz: number, highHz: number) => {
      const bins = { power, exclusionHalfWidthBins: half, effectiveAverages: 1 };
      const line = findStrongestLine(bins, Math.max(half + 1, lowHz / binWidthHz), highHz / binWidthHz);
      return line !== null && line.prominence >= TONE_PROMINENCE ? line.bin : null;
    };
    const near = (hz: number) => {
      const reachHz = Math.max(NEAR_SHARE * hz, NEAR_BINS * binWidthHz);
      return look(hz - reachHz, hz + reachHz);
    };
    if (nominal !== null) return sightOf(near(nominal.lowHz), near(nominal.highHz), binWidthHz);
    const strongest = look(LOWEST_HZ, HIGHEST_SHARE * source.sampleRateHz);
    if (strongest === null) return null;
    const peak = power[Math.round(strongest)];
    const first = Math.max(0, Math.round(strongest) - half - 1);
    power.fill(0, first, Math.round(strongest) + half + 2);
    const next = look(LOWEST_HZ, HIGHEST_SHARE * source.sampleRateHz);
    return next !== null && power[Math.round(next)] > WEAKEST * peak
      ? sightOf(strongest, next, binWidthHz)
      : null;
  });
}

function sightOf(one: number | null, other: number | null, binWidthHz: number): PairSight | null {
  if (one === null || other === null) return null;
  const lowHz = Math.min(one, other) * binWidthHz;
  const highHz = Math.max(one, other) * binWidthHz;
  const around = (hz: number): ToneSearch => ({ lowHz: hz - 4 * binWidthHz, highHz: hz + 4 * binWidthHz });
  return { lowHz, highHz, low: around(lowHz), high: around(highHz) };
}
