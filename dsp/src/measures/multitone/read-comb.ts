import type { SampleSource } from '../../source/sample-source.js';
import type { PowerSpectrum } from '../../spectrum/power-spectrum.js';
import { createLevelMeter, type LevelReading } from '../../level/create-level-meter.js';
import type { CaptureFacts } from '../../source/sample-source.js';
import type { AnalysisContext } from '../measure.js';
import { createSpectrumAccumulator, createSpectrumKit } from '../shared/averaged-spectrum.js';
import type { FramePlan } from '../shared/plan-frames.js';
import { streamFrames, type FrameRange } from '../shared/stream-frames.js';
import { createWindowTransform } from '../shared/window-transform.js';
import { fitComb } from './fit-comb.js';

export const COMB_WINDOW = 'blackman-harris-7';

/** One channel's comb. */
export interface CombReading {
  readonly spectrum: PowerSpectrum;
  readonly level: LevelReading;
  /** Mean square of each tone, FS². */
  readonly tones: Float64Array;
}

/**
 * Reads every tone of a comb in every channel.
 *
 * @param frequenciesHz - as they lie in the recording, ascending, all below half the rate
 */
export async function readComb(
  source: SampleSource,
  range: FrameRange,
  plan: FramePlan,
  frequenciesHz: readonly number[],
  context: Pick<AnalysisContext, 'signal'> & { readonly capture: CaptureFacts },
  onShare: (share: number) => void,
): Promise<CombReading[]> {
  const kit = createSpectrumKit(source.sampleRateHz, plan, COMB_WINDOW);
  const transform = createWindowTransform(COMB_WINDOW, plan.fftLength);
  const bins = frequenciesHz.map((hz) => (hz * plan.fftLength) / source.sampleRateHz);
  const { sampleFormat, bitsPerSample } = context.capture;
  const channels = Array.from({ length: source.channelCount }, () => {
    const tones = new Float64Array(bins.length);
    const accumulator = createSpectrumAccumulator(kit, (spectrum) => {
      const { re, im } = fitComb(spectrum, transform, bins);
      for (let k = 0; k < bins.length; k++) tones[k] += (re[k] * re[k] + im[k] * im[k]) / 2;
    });
    const meter = createLevelMeter(sampleFormat === 'integer' ? { integerBits: bitsPerSample } : {});
    return { tones, accumulator, meter };
  });
  await streamFrames(
    source,
    range,
    context,
    (block) => {
      block.forEach((samples, channel) => {
        channels[channel].accumulator.push(samples);
        channels[channel].meter.push(samples);
      });
    },
    onShare,
  );
  return channels.map(({ tones, accumulator, meter }) => ({
    spectrum: accumulator.finish().spectrum,
    level: meter.read(),
    tones: tones.map((sum) => sum / plan.starts.length),
  }));
}
