/** Full width of a Blackman window's transition times its length, in cycles a sample: -74 dB beyond. */
const BLACKMAN_WIDTH = 5.5;

function blackmanSinc(length: number, cutoff: number): Float64Array {
  const half = (length - 1) / 2;
  const kernel = Float64Array.from({ length }, (_, n) => {
    const turn = (2 * Math.PI * (n + 0.5)) / length;
    const window = 0.42 - 0.5 * Math.cos(turn) + 0.08 * Math.cos(2 * turn);
    const x = n - half;
    return window * (x === 0 ? 2 * cutoff : Math.sin(2 * Math.PI * cutoff * x) / (Math.PI * x));
  });
  const sum = kernel.reduce((total, tap) => total + tap, 0);
  return kernel.map((tap) => tap / sum);
}

/**
 * Designs a symmetric low-pass of unit gain at 0 Hz.
 *
 * @param passHz - kept up to here
 * @param stopHz - 74 dB down from here
 * @returns an odd number of taps
 * @see A. V. Oppenheim and R. W. Schafer, Discrete-Time Signal Processing, the window method (section from memory)
 */
export function designLowPass(passHz: number, stopHz: number, sampleRateHz: number): Float64Array {
  const half = Math.ceil((BLACKMAN_WIDTH * sampleRateHz) / (stopHz - passHz) / 2);
  return blackmanSinc(2 * half + 1, (passHz + stopHz) / 2 / sampleRateHz);
}

/** Designs the low-pass's complement: 74 dB down up to `stopHz`, kept from `passHz`. */
export function designHighPass(stopHz: number, passHz: number, sampleRateHz: number): Float64Array {
  const kernel = designLowPass(stopHz, passHz, sampleRateHz).map((tap) => -tap);
  kernel[(kernel.length - 1) / 2] += 1;
  return kernel;
}
