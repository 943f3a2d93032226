import { quantisationNoise } from '../../level/quantisation.js';
import type { CaptureFacts } from '../../source/sample-source.js';
import type { PowerSpectrum } from '../../spectrum/power-spectrum.js';
import { readNoise } from './band-noise.js';
import type { Band } from './settings-band.js';

/** Noise of an ideal quantiser in a band, FS²: flat and weighted. */
export interface QuantisationFloor {
  readonly flat: number;
  readonly aWeighted: number;
  readonly itu468Rms: number;
}

/** Widest integers whose quantising noise can show in Float64 arithmetic over a band. */
const WIDEST_BITS = 32;

/**
 * Gives the noise that the recording's own word length makes, white to half the rate, with triangular dither of 2 LSB.
 *
 * @returns null for float samples, which quantise in proportion to the signal
 * @see Lipshitz, Wannamaker and Vanderkooy, "Quantization and Dither: A Theoretical Survey", JAES 40(5), 1992
 */
export function quantisationFloor(
  capture: CaptureFacts,
  spectrum: PowerSpectrum,
  band: Pick<Band, 'lowHz' | 'highHz'>,
): QuantisationFloor | null {
  if (capture.sampleFormat === 'float' || capture.bitsPerSample > WIDEST_BITS) return null;
  const perBin = quantisationNoise(capture.bitsPerSample, 'triangular') / (spectrum.power.length - 1);
  const readings = readNoise(spectrum, new Float64Array(spectrum.power.length).fill(perBin), band);
  return {
    flat: readings.flat.meanSquare,
    aWeighted: readings.aWeighted.meanSquare,
    itu468Rms: readings.itu468Rms.meanSquare,
  };
}
