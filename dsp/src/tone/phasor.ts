/** Steps of the running product between two fresh values: its error stays below 1e-14. */
const RENEW_EVERY = 32;

/**
 * Writes cos and sin of an evenly growing phase.
 *
 * @param radPerSample - growth
 * @param startRad - phase of the first element
 * @param cos, sin - written, of equal length
 */
export function writePhasor(
  radPerSample: number,
  startRad: number,
  cos: Float64Array,
  sin: Float64Array,
): void {
  const stepCos = Math.cos(radPerSample);
  const stepSin = Math.sin(radPerSample);
  let c = 1;
  let s = 0;
  for (let n = 0; n < cos.length; n++) {
    if (n % RENEW_EVERY === 0) {
      c = Math.cos(startRad + radPerSample * n);
      s = Math.sin(startRad + radPerSample * n);
    }
    cos[n] = c;
    sin[n] = s;
    const next = c * stepCos - s * stepSin;
    s = s * stepCos + c * stepSin;
    c = next;
  }
}
