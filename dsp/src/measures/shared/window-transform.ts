import type { WindowName } from '../../window/window-coefficients.js';
import { WINDOW_COEFFICIENTS } from '../../window/window-coefficients.js';

/** The Fourier transform of a window, centred on its middle sample, where it is real. */
export interface WindowTransform {
  readonly fftLength: number;
  /** Bins each side that a line's lobe covers. */
  readonly halfWidthBins: number;
  /** The transform `offsetBins` from the line's true place; its value at 0 is the sum of the window. */
  at(offsetBins: number): number;
}

/**
 * Makes the transform of a periodic cosine-sum window.
 *
 * With time counted from the window's middle, w(m) = Σ a_k cos(2πkm/N), and each term is a pair of Dirichlet kernels at
 * ±k bins. Sums run from -N/2 to N/2 with halved ends: exact, as the window's two ends are one and the same sample.
 *
 * @param fftLength - N, samples
 * @see F. J. Harris, "On the use of windows for harmonic analysis with the discrete Fourier transform", Proc. IEEE 66(1), 1978
 */
export function createWindowTransform(name: WindowName, fftLength: number): WindowTransform {
  const coefficients = WINDOW_COEFFICIENTS[name];
  const dirichlet = (sine: number, offset: number): number => {
    if (Math.abs(offset) < 1e-12) return fftLength;
    return sine / Math.tan((Math.PI * offset) / fftLength);
  };
  const at = (offsetBins: number): number => {
    const sine = Math.sin(Math.PI * offsetBins);
    let sum = coefficients[0] * dirichlet(sine, offsetBins);
    for (let k = 1; k < coefficients.length; k++) {
      const sineK = k % 2 === 0 ? sine : -sine;
      sum += (coefficients[k] / 2) * (dirichlet(sineK, offsetBins - k) + dirichlet(sineK, offsetBins + k));
    }
    return sum;
  };
  return { fftLength, halfWidthBins: coefficients.length, at };
}
