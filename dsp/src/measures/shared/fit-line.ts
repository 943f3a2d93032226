import type { WindowTransform } from './window-transform.js';

/** One line of a windowed spectrum: A sin(ωt + φ), φ at the middle of the frame. */
export interface SpectrumLine {
  /** Place in bins, fractions allowed. */
  readonly bin: number;
  /** A cos φ and A sin φ. */
  readonly inPhase: number;
  readonly quadrature: number;
}

/** A frame's transform, unscaled, bins 0 to N/2, phases counted from the frame's first sample. */
export interface ComplexSpectrum {
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/**
 * Takes the complex amplitude of a line at a known place: the least-squares fit of the window's lobe to the bins it
 * covers.
 *
 * @param spectrum - not modified
 * @param bin - the line's place, halfWidthBins ≤ bin ≤ N/2 - halfWidthBins
 * @returns amplitude as peak value, phase at the frame's middle against a sine
 */
export function amplitudeAt(
  spectrum: ComplexSpectrum,
  transform: WindowTransform,
  bin: number,
): SpectrumLine {
  const half = transform.halfWidthBins;
  const from = Math.max(1, Math.ceil(bin - half));
  const to = Math.min(spectrum.re.length - 2, Math.floor(bin + half));
  let re = 0;
  let im = 0;
  let energy = 0;
  for (let k = from; k <= to; k++) {
    const lobe = transform.at(k - bin);
    // Counting time from the frame's middle turns bin k by kπ.
    const signed = k % 2 === 0 ? lobe : -lobe;
    re += signed * spectrum.re[k];
    im += signed * spectrum.im[k];
    energy += lobe * lobe;
  }
  // X = (A / 2i) e^(iφ) W, so A e^(iφ) = 2i X / W.
  return { bin, inPhase: (-2 * im) / energy, quadrature: (2 * re) / energy };
}

const DERIVATIVE_STEP_BINS = 1e-4;
const STEPS_AT_MOST = 12;
const CONVERGED_BINS = 1e-11;

/**
 * Finds a line's exact place near a start value by Gauss-Newton steps on the lobe's least squares.
 *
 * @param spectrum - not modified
 * @param startBin - within half a bin of the line
 * @returns the line; its place stays within one bin of the start, whatever the spectrum holds
 */
export function fitLine(
  spectrum: ComplexSpectrum,
  transform: WindowTransform,
  startBin: number,
): SpectrumLine {
  let bin = startBin;
  for (let step = 0; step < STEPS_AT_MOST; step++) {
    const change = placeCorrection(spectrum, transform, bin);
    if (!Number.isFinite(change)) break;
    bin = Math.min(startBin + 1, Math.max(startBin - 1, bin + change));
    if (Math.abs(change) < CONVERGED_BINS) break;
  }
  return amplitudeAt(spectrum, transform, bin);
}

/** One Gauss-Newton step of the place: the residual of the lobe's fit, projected on the lobe's slope. */
function placeCorrection(spectrum: ComplexSpectrum, transform: WindowTransform, bin: number): number {
  const line = amplitudeAt(spectrum, transform, bin);
  // The line's transform is c W with c = A e^(iφ) / 2i.
  const cRe = line.quadrature / 2;
  const cIm = -line.inPhase / 2;
  const from = Math.max(1, Math.ceil(bin - transform.halfWidthBins));
  const to = Math.min(spectrum.re.length - 2, Math.floor(bin + transform.halfWidthBins));
  let projection = 0;
  let energy = 0;
  for (let k = from; k <= to; k++) {
    const sign = k % 2 === 0 ? 1 : -1;
    const lobe = transform.at(k - bin);
    const slope =
      (transform.at(k - bin - DERIVATIVE_STEP_BINS) - transform.at(k - bin + DERIVATIVE_STEP_BINS)) /
      (2 * DERIVATIVE_STEP_BINS);
    const restRe = sign * spectrum.re[k] - cRe * lobe;
    const restIm = sign * spectrum.im[k] - cIm * lobe;
    projection += (restRe * cRe + restIm * cIm) * slope;
    energy += (cRe * cRe + cIm * cIm) * slope * slope;
  }
  return energy > 0 ? projection / energy : Number.NaN;
}
