import { countEffectiveAverages } from '../../spectrum/effective-averages.js';
import type { PowerSpectrum } from '../../spectrum/power-spectrum.js';
import { createRealFft, type RealFft } from '../../spectrum/create-real-fft.js';
import { createWindow, type CosineWindow } from '../../window/create-window.js';
import { WINDOW_COEFFICIENTS, type WindowName } from '../../window/window-coefficients.js';
import type { ComplexSpectrum } from './fit-line.js';
import { createFrameWalker } from './frame-walker.js';
import type { FramePlan } from './plan-frames.js';

/** What several channels' spectra share: one window, one transform. */
export interface SpectrumKit {
  readonly sampleRateHz: number;
  readonly plan: FramePlan;
  readonly window: CosineWindow;
  readonly transform: (samples: Float64Array, re: Float64Array, im: Float64Array) => void;
  /** What the plan's overlapping frames are worth, as `countEffectiveAverages` gives it. */
  readonly worth: ReturnType<typeof countEffectiveAverages>;
}

export function createSpectrumKit(
  sampleRateHz: number,
  plan: FramePlan,
  windowName: WindowName,
): SpectrumKit {
  // Frames lie evenly spread, to a sample.
  const hop = plan.starts.length > 1 ? plan.starts[1] : plan.fftLength;
  const { window, fft, worth } = takeTables(windowName, plan.fftLength, plan.starts.length, hop);
  return {
    sampleRateHz,
    plan,
    window,
    transform: (samples, re, im) => fft.transform(samples, re, im),
    worth,
  };
}

interface SpectrumTables {
  readonly window: CosineWindow;
  readonly fft: RealFft;
  readonly worth: SpectrumKit['worth'];
}

/** Parts of a programme call for the same few lengths again and again; what was used longest ago goes first. */
const TABLES_KEPT = 4;
const tables = new Map<string, SpectrumTables>();

function takeTables(windowName: WindowName, fftLength: number, frames: number, hop: number): SpectrumTables {
  const key = `${windowName}/${fftLength}/${frames}/${hop}`;
  const known = tables.get(key) ?? makeTables(windowName, fftLength, frames, hop);
  tables.delete(key);
  tables.set(key, known);
  const [oldest] = tables.keys();
  if (tables.size > TABLES_KEPT) tables.delete(oldest);
  return known;
}

function makeTables(windowName: WindowName, fftLength: number, frames: number, hop: number): SpectrumTables {
  const window = createWindow(windowName, fftLength);
  return {
    window,
    fft: createRealFft(fftLength),
    worth: countEffectiveAverages(window, frames, hop, hop),
  };
}

export interface SpectrumAccumulator {
  push(samples: Float64Array): void;
  finish(): { readonly spectrum: PowerSpectrum; readonly constant: number };
}

/**
 * Averages one channel's power spectra while samples stream past.
 *
 * @param kit - shared by the channels of an analysis, used by one at a time
 * `finish` gives the constant part too, FS: the windowed mean, to which a tone adds nothing, as it would to the plain mean
 * of a segment that doesn't hold whole periods.
 *
 * @param onSpectrum - told each frame's transform, unscaled, its constant part taken out, and its first sample; reused arrays
 */
export function createSpectrumAccumulator(
  kit: SpectrumKit,
  onSpectrum: (spectrum: ComplexSpectrum, startSample: number) => void = () => undefined,
): SpectrumAccumulator {
  const { plan, window, sampleRateHz } = kit;
  const { fftLength } = plan;
  const half = fftLength / 2;
  const weighted = new Float64Array(fftLength);
  const re = new Float64Array(half + 1);
  const im = new Float64Array(half + 1);
  const power = new Float64Array(half + 1);
  let averages = 0;
  let sumOfConstants = 0;
  const walker = createFrameWalker(plan, (frame, index) => {
    weigh(frame, window.samples, weighted);
    kit.transform(weighted, re, im);
    sumOfConstants += re[0] / (fftLength * window.coherentGain);
    takeOutConstant(re, window.name);
    addPower(re, im, power);
    averages++;
    onSpectrum({ re, im }, plan.starts[index]);
  });
  return {
    push: (samples) => walker.push(samples),
    finish: () => {
      const scale = 2 / (fftLength * fftLength * window.powerGain * Math.max(1, averages));
      const scaled = power.map((value) => value * scale);
      scaled[half] /= 2; // half the rate stands for itself alone, every other bin for two
      const spectrum: PowerSpectrum = {
        sampleRateHz,
        fftLength,
        binWidthHz: sampleRateHz / fftLength,
        windowName: window.name,
        enbwBins: window.enbwBins,
        exclusionHalfWidthBins: window.exclusionHalfWidthBins,
        averages,
        ...kit.worth,
        power: scaled,
      };
      return { spectrum, constant: sumOfConstants / Math.max(1, averages) };
    },
  };
}

// Functions of their own, so that the arrays are locals and not looked up anew at each value.

function weigh(frame: Float64Array, shape: Float64Array, weighted: Float64Array): void {
  for (let n = 0; n < weighted.length; n++) weighted[n] = frame[n] * shape[n];
}

function addPower(re: Float64Array, im: Float64Array, power: Float64Array): void {
  for (let k = 0; k < power.length; k++) power[k] += re[k] * re[k] + im[k] * im[k];
}

/**
 * Takes a constant out of a frame's transform exactly, by the window's known lobe around 0 Hz: in a short record that
 * lobe would reach into the band and hide hum and low tones.
 */
function takeOutConstant(re: Float64Array, windowName: WindowName): void {
  const coefficients = WINDOW_COEFFICIENTS[windowName];
  const constant = re[0] / coefficients[0];
  for (let k = 1; k < coefficients.length && k < re.length; k++) {
    re[k] -= ((k % 2 === 0 ? 1 : -1) * constant * coefficients[k]) / 2;
  }
  re[0] = 0;
}
