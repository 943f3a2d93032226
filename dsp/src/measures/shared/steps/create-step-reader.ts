import { createLevelMeter, type LevelReading } from '../../../level/create-level-meter.js';
import type { CaptureFacts } from '../../../source/sample-source.js';
import type { PowerSpectrum } from '../../../spectrum/power-spectrum.js';
import { createWindow, type CosineWindow } from '../../../window/create-window.js';
import { createSpectrumAccumulator, createSpectrumKit, type SpectrumKit } from '../averaged-spectrum.js';
import { planFrames } from '../plan-frames.js';
import { createToneTracker, type ToneTrack } from '../tone-tracker.js';

export const STEP_WINDOW = 'blackman-harris-7';

/** One channel of one step. */
export interface StepReading {
  readonly spectrum: PowerSpectrum;
  readonly constant: number;
  readonly level: LevelReading;
  /** null where no tone stands out near the place looked at. */
  readonly tone: ToneTrack | null;
}

export interface StepReader {
  /**
   * @param samples - one channel of a step
   * @param nearHz - where its tone is looked for; null for none
   */
  read(samples: Float64Array, nearHz: number | null): StepReading;
  /** Mean square of a tone at an exactly known frequency, over every sample, with the noise in it still there, FS². */
  powerAt(samples: Float64Array, frequencyHz: number): number;
  /** Bandwidth of `powerAt`, Hz. */
  bandwidthOf(samples: Float64Array): number;
}

/** As far as a tone is looked for beside its place: a share of it, but at least so many bins. */
const NEAR = 0.01;
const NEAR_BINS = 1.5;

/** Makes a reader of steps that shares windows and transforms between steps of one length. */
export function createStepReader(sampleRateHz: number, capture: CaptureFacts): StepReader {
  const kits = new Map<number, SpectrumKit>();
  const windows = new Map<number, CosineWindow>();
  const kitOf = (length: number): SpectrumKit => {
    const kit = kits.get(length) ?? createSpectrumKit(sampleRateHz, planFrames(length), STEP_WINDOW);
    kits.set(length, kit);
    return kit;
  };
  const windowOf = (length: number): CosineWindow => {
    const window = windows.get(length) ?? createWindow(STEP_WINDOW, length);
    windows.set(length, window);
    return window;
  };
  const integerBits = capture.sampleFormat === 'integer' ? capture.bitsPerSample : undefined;
  return {
    read: (samples, nearHz) => {
      const kit = kitOf(samples.length);
      const reachHz = Math.max(NEAR * (nearHz ?? 0), (NEAR_BINS * sampleRateHz) / kit.plan.fftLength);
      const tracker =
        nearHz === null
          ? null
          : createToneTracker(kit, { lowHz: nearHz - reachHz, highHz: nearHz + reachHz });
      const accumulator = createSpectrumAccumulator(kit, (spectrum, start) =>
        tracker?.onSpectrum(spectrum, start),
      );
      const meter = createLevelMeter(integerBits === undefined ? {} : { integerBits });
      meter.push(samples);
      accumulator.push(samples);
      return { ...accumulator.finish(), level: meter.read(), tone: tracker?.finish() ?? null };
    },
    powerAt: (samples, frequencyHz) =>
      tonePower(samples, windowOf(samples.length), (2 * Math.PI * frequencyHz) / sampleRateHz),
    bandwidthOf: ({ length }) => (windowOf(length).enbwBins * sampleRateHz) / length,
  };
}

/** Rotations are begun anew after so many samples, so that rounding doesn't grow. */
const RUN = 4096;

function tonePower(samples: Float64Array, window: CosineWindow, turn: number): number {
  const [stepRe, stepIm] = [Math.cos(turn), Math.sin(turn)];
  let [sumRe, sumIm] = [0, 0];
  for (let from = 0; from < samples.length; from += RUN) {
    let [re, im] = [Math.cos(turn * from), Math.sin(turn * from)];
    const to = Math.min(samples.length, from + RUN);
    for (let n = from; n < to; n++) {
      const x = samples[n] * window.samples[n];
      sumRe += x * re;
      sumIm += x * im;
      const next = re * stepRe - im * stepIm;
      im = re * stepIm + im * stepRe;
      re = next;
    }
  }
  const sum = samples.length * window.coherentGain;
  return (2 * (sumRe * sumRe + sumIm * sumIm)) / (sum * sum);
}
