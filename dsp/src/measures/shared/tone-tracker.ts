import type { SpectrumKit } from './averaged-spectrum.js';
import { findStrongestLine } from './find-line.js';
import { amplitudeAt, fitLine, type ComplexSpectrum } from './fit-line.js';
import { createWindowTransform } from './window-transform.js';

/** A line this many times the noise a bin around it is a tone: noise alone reaches about 12 in one frame. */
export const TONE_PROMINENCE = 100;
/** Harmonics that 1,024 points over a period can carry. */
export const HIGHEST_FOLDED_HARMONIC = 511;

/** A tone followed through a segment. */
export interface ToneTrack {
  readonly frequencyHz: number;
  /** Mean of the frames' peak values, FS. */
  readonly amplitude: number;
  /**
   * Coherent means of the harmonics over the fundamental's phase: A_n e^(i(φn - nφ1)), index n, peak values, FS;
   * 0 and 1 hold nothing. Up to half the rate or the 511th.
   */
  readonly harmonics: readonly { readonly re: number; readonly im: number }[];
  readonly frameCount: number;
  /** Greatest less least level of the frames, dB. */
  readonly levelSpreadDb: number;
  /** Greatest less least frequency of the frames, bins. */
  readonly frequencySpreadBins: number;
}

export interface ToneTracker {
  onSpectrum(spectrum: ComplexSpectrum, startSample: number): void;
  /** @returns null when no frame held a tone */
  finish(): ToneTrack | null;
}

export interface ToneSearch {
  readonly lowHz: number;
  readonly highHz: number;
}

interface FrameTone {
  readonly centreSample: number;
  readonly bin: number;
  readonly amplitude: number;
  readonly phase: number;
}

/**
 * Follows a tone from frame to frame and takes its harmonics in step with it.
 *
 * The fundamental's phase is measured anew in every frame and the harmonics are averaged against it, so a clock that
 * drifts over a long file smears nothing. What is kept between frames is one complex number a harmonic: this is the
 * synchronous average of the wave over its own period, as its Fourier coefficients, and holds also where the tone
 * shares a clock with the sampling and only a few phases ever occur.
 *
 * @param search - where to look; the strongest line there is the tone, from the first frame that has one
 */
export function createToneTracker(kit: SpectrumKit, search: ToneSearch): ToneTracker {
  const { sampleRateHz, plan, window } = kit;
  const binWidthHz = sampleRateHz / plan.fftLength;
  const transform = createWindowTransform(window.name, plan.fftLength);
  const half = window.exclusionHalfWidthBins;
  const fromBin = Math.max(search.lowHz / binWidthHz, half);
  const toBin = Math.min(search.highHz / binWidthHz, plan.fftLength / 2 - half);
  const frames: FrameTone[] = [];
  const sums: { re: number; im: number }[] = [];

  const startBin = (spectrum: ComplexSpectrum): number | null => {
    const previous = frames[frames.length - 1] as FrameTone | undefined;
    const from = previous === undefined ? fromBin : Math.max(fromBin, previous.bin - half);
    const to = previous === undefined ? toBin : Math.min(toBin, previous.bin + half);
    const power = new Float64Array(spectrum.re.length);
    const span = previous === undefined ? power.length : Math.ceil(to) + 500;
    for (
      let k = Math.max(0, Math.floor(previous === undefined ? 0 : from - 500));
      k < Math.min(span, power.length);
      k++
    ) {
      power[k] = spectrum.re[k] ** 2 + spectrum.im[k] ** 2;
    }
    const line = findStrongestLine({ power, exclusionHalfWidthBins: half, effectiveAverages: 1 }, from, to);
    return line !== null && line.prominence >= TONE_PROMINENCE ? line.bin : null;
  };

  const addHarmonics = (spectrum: ComplexSpectrum, bin: number, phase: number): void => {
    const highest = Math.min(HIGHEST_FOLDED_HARMONIC, Math.floor((plan.fftLength / 2 - half - 1) / bin));
    const [turnRe, turnIm] = [Math.cos(phase), -Math.sin(phase)];
    let [re, im] = [turnRe, turnIm];
    for (let n = 2; n <= highest; n++) {
      [re, im] = [re * turnRe - im * turnIm, re * turnIm + im * turnRe];
      const line = amplitudeAt(spectrum, transform, n * bin);
      const sum = (sums[n] ??= { re: 0, im: 0 });
      sum.re += line.inPhase * re - line.quadrature * im;
      sum.im += line.inPhase * im + line.quadrature * re;
    }
  };

  return {
    onSpectrum: (spectrum, startSample) => {
      const start = startBin(spectrum);
      if (start === null) return;
      const line = fitLine(spectrum, transform, start);
      const phase = Math.atan2(line.quadrature, line.inPhase);
      const amplitude = Math.hypot(line.inPhase, line.quadrature);
      if (!(amplitude > 0)) return;
      frames.push({ centreSample: startSample + plan.fftLength / 2, bin: line.bin, amplitude, phase });
      addHarmonics(spectrum, line.bin, phase);
    },
    finish: () => (frames.length === 0 ? null : summarise(frames, sums, sampleRateHz, plan.fftLength)),
  };
}

function summarise(
  frames: readonly FrameTone[],
  sums: readonly { re: number; im: number }[],
  sampleRateHz: number,
  fftLength: number,
): ToneTrack {
  const count = frames.length;
  const amplitudes = frames.map(({ amplitude }) => amplitude);
  const bins = frames.map(({ bin }) => bin);
  return {
    frequencyHz: (frequencyOf(frames, fftLength) * sampleRateHz) / (2 * Math.PI),
    amplitude: amplitudes.reduce((sum, value) => sum + value, 0) / count,
    harmonics: Array.from(sums, (sum: { re: number; im: number } | undefined) =>
      sum === undefined ? { re: 0, im: 0 } : { re: sum.re / count, im: sum.im / count },
    ),
    frameCount: count,
    levelSpreadDb: 20 * Math.log10(Math.max(...amplitudes) / Math.min(...amplitudes)),
    frequencySpreadBins: Math.max(...bins) - Math.min(...bins),
  };
}

/** Slope of the unwrapped phase over the frames' middles, radians a sample; one frame gives its own place. */
function frequencyOf(frames: readonly FrameTone[], fftLength: number): number {
  const radiansPerBin = (2 * Math.PI) / fftLength;
  if (frames.length === 1) return frames[0].bin * radiansPerBin;
  // Phase less that of a steady tone at the first frame's frequency: small numbers keep their digits.
  const steady = frames[0].bin * radiansPerBin;
  const first = frames[0].centreSample;
  let turned = 0;
  let [sumT, sumP, sumTT, sumTP] = [0, 0, 0, 0];
  frames.forEach((frame, index) => {
    const t = frame.centreSample - first;
    if (index > 0) {
      const before = frames[index - 1];
      const gap = frame.centreSample - before.centreSample;
      const expected = ((frame.bin + before.bin) / 2) * radiansPerBin * gap;
      const advance = expected + wrapPhase(frame.phase - before.phase - expected);
      turned += advance - steady * gap;
    }
    sumT += t;
    sumP += turned;
    sumTT += t * t;
    sumTP += t * turned;
  });
  const count = frames.length;
  return steady + (count * sumTP - sumT * sumP) / (count * sumTT - sumT * sumT);
}

/** Brings an angle into (-π, π]. */
export function wrapPhase(phase: number): number {
  const turns = Math.ceil((phase - Math.PI) / (2 * Math.PI));
  return phase - turns * 2 * Math.PI;
}
