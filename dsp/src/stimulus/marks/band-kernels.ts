/** Full width of a Hamming window's transition times its length, in cycles a sample: -53 dB beyond. */
const HAMMING_WIDTH = 3.3;

function hammingSinc(length: number, cutoff: number): Float64Array {
  const half = (length - 1) / 2;
  const kernel = Float64Array.from({ length }, (_, n) => {
    const turn = (2 * Math.PI * (n + 0.5)) / length;
    const window = 0.54 - 0.46 * Math.cos(turn);
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
 * @param stopHz - 53 dB down from here
 * @returns an odd number of taps
 * @see A. V. Oppenheim and R. W. Schafer, Discrete-Time Signal Processing, the window method (section from memory)
 */
export function designLowPass(passHz: number, stopHz: number, sampleRateHz: number): Float64Array {
  const half = Math.ceil((HAMMING_WIDTH * sampleRateHz) / (stopHz - passHz) / 2);
  return hammingSinc(2 * half + 1, (passHz + stopHz) / 2 / sampleRateHz);
}

/** Designs the low-pass's complement: 53 dB down up to `stopHz`, kept from `passHz`. */
export function designHighPass(stopHz: number, passHz: number, sampleRateHz: number): Float64Array {
  const kernel = designLowPass(stopHz, passHz, sampleRateHz).map((tap) => -tap);
  kernel[(kernel.length - 1) / 2] += 1;
  return kernel;
}
