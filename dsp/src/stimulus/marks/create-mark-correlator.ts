import { createRealFft } from '../../spectrum/create-real-fft.js';
import { MARK_DURATION_S, MARK_LOW_HZ, markAt, quadratureMarkAt } from '../mark-chirp.js';
import { designHighPass } from './band-kernels.js';
import { invertRealFft } from './inverse-transform.js';

/** Holds blocks of samples against a mark. */
export interface MarkCorrelator {
  /** Frames that a mark takes. */
  readonly markLength: number;
  /** Frames at each end of a block whose results aren't good. */
  readonly edgeLength: number;
  /** Sum of a mark's squares. */
  readonly energy: number;
  /**
   * @param block - FFT_LENGTH samples, not modified
   * @returns the block without what lies below the marks' band, and the squared envelope of its correlation with a mark
   *   that begins at the frame; good from `edgeLength` to `edgeLength + markLength` before the end; overwritten next time
   */
  correlate(block: Float64Array): { readonly band: Float64Array; readonly squaredEnvelope: Float64Array };
}

export const FFT_LENGTH = 16_384;
const BINS = FFT_LENGTH / 2 + 1;
/** Hum and the lead-in lie below, and may be stronger than the marks. */
const HIGH_PASS_FROM_HZ = 1000;

interface HalfSpectrum {
  readonly re: Float64Array;
  readonly im: Float64Array;
}

function emptySpectrum(): HalfSpectrum {
  return { re: new Float64Array(BINS), im: new Float64Array(BINS) };
}

/** Writes the spectrum of the correlation: a · conj(b). */
function multiply(a: HalfSpectrum, b: HalfSpectrum, product: HalfSpectrum): void {
  for (let k = 0; k < BINS; k++) {
    product.re[k] = a.re[k] * b.re[k] + a.im[k] * b.im[k];
    product.im[k] = a.im[k] * b.re[k] - a.re[k] * b.im[k];
  }
}

function centre(kernel: Float64Array): Float64Array {
  const centred = new Float64Array(FFT_LENGTH);
  const half = (kernel.length - 1) / 2;
  kernel.forEach((tap, k) => (centred[(k - half + FFT_LENGTH) % FFT_LENGTH] = tap));
  return centred;
}

/**
 * Plans correlation by transforms, in phase and in quadrature, so that gain, polarity and phase of the chain don't matter.
 *
 * @see A. V. Oppenheim and R. W. Schafer, Discrete-Time Signal Processing, block convolution (section from memory)
 */
export function createMarkCorrelator(sampleRateHz: number): MarkCorrelator {
  const fft = createRealFft(FFT_LENGTH);
  const spectrumOf = (samples: Float64Array): HalfSpectrum => {
    const spectrum = emptySpectrum();
    fft.transform(samples, spectrum.re, spectrum.im);
    return spectrum;
  };
  const markLength = Math.ceil(MARK_DURATION_S * sampleRateHz);
  const sampled = (wave: (atS: number) => number) =>
    Float64Array.from({ length: FFT_LENGTH }, (_, n) => wave(n / sampleRateHz));
  const mark = sampled(markAt);
  const inPhaseMark = spectrumOf(mark);
  const quadratureMark = spectrumOf(sampled(quadratureMarkAt));
  const kernel = designHighPass(HIGH_PASS_FROM_HZ, MARK_LOW_HZ, sampleRateHz);
  // Symmetric about frame 0: its spectrum is real, and nothing is delayed.
  const highPass = spectrumOf(centre(kernel)).re;
  const spectrum = emptySpectrum();
  const product = emptySpectrum();
  const [band, squaredEnvelope, quadrature] = Array.from({ length: 3 }, () => new Float64Array(FFT_LENGTH));
  return {
    markLength,
    edgeLength: (kernel.length - 1) / 2,
    energy: mark.reduce((sum, x) => sum + x * x, 0),
    correlate: (block) => {
      fft.transform(block, spectrum.re, spectrum.im);
      for (let k = 0; k < BINS; k++) {
        spectrum.re[k] *= highPass[k];
        spectrum.im[k] *= highPass[k];
      }
      multiply(spectrum, inPhaseMark, product);
      invertRealFft(fft, product.re, product.im, squaredEnvelope);
      multiply(spectrum, quadratureMark, product);
      invertRealFft(fft, product.re, product.im, quadrature);
      invertRealFft(fft, spectrum.re, spectrum.im, band);
      for (let n = 0; n < FFT_LENGTH; n++) {
        squaredEnvelope[n] = squaredEnvelope[n] * squaredEnvelope[n] + quadrature[n] * quadrature[n];
      }
      return { band, squaredEnvelope };
    },
  };
}
