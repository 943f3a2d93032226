/** Blocks that a record is summed up into: enough for offsets of a few bins. */
const BLOCKS = 64;
const GRID_PER_BIN = 4;

/**
 * Finds the frequency of greatest windowed response near a start, to about a hundredth of a bin.
 *
 * The record is brought down to 0 Hz with the start frequency and summed up in blocks; the search runs over those.
 *
 * @param weights - window, one value a sample
 * @param startRad - rad per sample
 * @param searchBins - reach to both sides in bins of 1/duration, at most 16
 * @returns rad per sample, between 0 and π
 */
export function searchNear(
  samples: Float64Array,
  weights: Float64Array,
  startRad: number,
  searchBins: number,
): number {
  const length = samples.length;
  const blockLength = Math.max(1, Math.ceil(length / BLOCKS));
  const blocks = Math.ceil(length / blockLength);
  const re = new Float64Array(blocks);
  const im = new Float64Array(blocks);
  const stepCos = Math.cos(startRad);
  const stepSin = Math.sin(startRad);
  for (let block = 0; block < blocks; block++) {
    const from = block * blockLength;
    const to = Math.min(length, from + blockLength);
    let c = 1;
    let s = 0;
    for (let n = from; n < to; n++) {
      if ((n - from) % 32 === 0) {
        c = Math.cos(startRad * n);
        s = Math.sin(startRad * n);
      }
      const value = weights[n] * samples[n];
      re[block] += value * c;
      im[block] -= value * s;
      const next = c * stepCos - s * stepSin;
      s = s * stepCos + c * stepSin;
      c = next;
    }
  }
  const powerAt = (bins: number): number => {
    const turn = (2 * Math.PI * bins * blockLength) / length;
    let sumRe = 0;
    let sumIm = 0;
    for (let block = 0; block < blocks; block++) {
      const c = Math.cos(turn * block);
      const s = Math.sin(turn * block);
      sumRe += re[block] * c + im[block] * s;
      sumIm += im[block] * c - re[block] * s;
    }
    return sumRe * sumRe + sumIm * sumIm;
  };

  // Below one bin there is no tone to speak of: the search stays clear of 0 and of half the sample rate.
  const startBins = (startRad * length) / (2 * Math.PI);
  const reach = Math.min(
    searchBins,
    16,
    Math.max(0, startBins - 0.5),
    Math.max(0, length / 2 - startBins - 0.5),
  );
  let best = 0;
  let bestPower = powerAt(0);
  const steps = Math.floor(reach * GRID_PER_BIN);
  for (let step = -steps; step <= steps; step++) {
    const power = powerAt(step / GRID_PER_BIN);
    if (power > bestPower) {
      bestPower = power;
      best = step / GRID_PER_BIN;
    }
  }
  const before = Math.log(powerAt(best - 1 / GRID_PER_BIN));
  const at = Math.log(bestPower);
  const after = Math.log(powerAt(best + 1 / GRID_PER_BIN));
  const curvature = before - 2 * at + after;
  const shift = curvature < 0 ? (0.5 * (before - after)) / curvature : 0;
  const offset = best + (Math.abs(shift) <= 1 ? shift : 0) / GRID_PER_BIN;
  return startRad + (2 * Math.PI * offset) / length;
}
