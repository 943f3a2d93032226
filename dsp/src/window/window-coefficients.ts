export const WINDOW_NAMES = [
  'rectangular',
  'hann',
  'blackman-harris-4',
  'blackman-harris-7',
  'hft116d',
  'hft144d',
  'hft248d',
] as const;
export type WindowName = (typeof WINDOW_NAMES)[number];

/**
 * Coefficients a_k of w[n] = Σ (-1)^k a_k cos(2πkn/N).
 *
 * @see F. J. Harris, "On the use of windows for harmonic analysis with the DFT", Proc. IEEE 66(1), 1978: hann,
 *   blackman-harris-4
 * @see O. M. Solomon, "The use of DFT windows in signal-to-noise ratio and harmonic distortion computations",
 *   IEEE Trans. Instrum. Meas. 43(2), 1994: blackman-harris-7 (as public code gives it)
 * @see G. Heinzel, A. Rüdiger and R. Schilling, "Spectrum and spectral density estimation by the DFT", Max Planck
 *   Institute for Gravitational Physics, 2002: the flat-tops; the coefficients of hft116d and hft144d are from memory,
 *   their side lobes and noise bandwidths agree with the published ones
 */
export const WINDOW_COEFFICIENTS: Readonly<Record<WindowName, readonly number[]>> = {
  rectangular: [1],
  hann: [0.5, 0.5],
  'blackman-harris-4': [0.35875, 0.48829, 0.14128, 0.01168],
  'blackman-harris-7': [
    0.27105140069342, 0.43329793923448, 0.21812299954311, 0.06592544638803, 0.01081174209837,
    0.00077658482522, 0.00001388721735,
  ],
  hft116d: [1, 1.9575375, 1.4780705, 0.6367431, 0.1228389, 0.0066288],
  hft144d: [1, 1.96760033, 1.57983607, 0.81123644, 0.22583558, 0.02773848, 0.0009036],
  hft248d: [
    1, 1.985844164102, 1.791176438506, 1.282075284005, 0.667777530266, 0.240160796576, 0.056656381764,
    0.008134974479, 0.00062454465, 0.000019808998, 0.000000132974,
  ],
};
