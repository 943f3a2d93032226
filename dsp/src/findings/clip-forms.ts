/** Fundamental of a unit sine clipped on one half at c. @see Fourier series: 1 - (p - c sin p)/π, p = arccos c */
export function oneSidedFundamental(c: number): number {
  if (c >= 1) return 1;
  const p = Math.acos(Math.max(-1, c));
  return 1 - (p - c * Math.sin(p)) / Math.PI;
}

/** Fundamental of a unit sine clipped on both halves at ±c. @see Fourier series: (2/π)(t + c cos t), t = arcsin c */
export function twoSidedFundamental(c: number): number {
  if (c >= 1) return 1;
  const t = Math.asin(Math.max(0, c));
  return (2 / Math.PI) * (t + c * Math.cos(t));
}

/** The c at which a fundamental is lowered by so many dB; both forms rise with c. */
export function clipForDeviation(fundamental: (c: number) => number, deviationDb: number): number {
  const wanted = 10 ** (deviationDb / 20);
  let [low, high] = [0, 1];
  for (let step = 0; step < 60; step++) {
    const middle = (low + high) / 2;
    if (fundamental(middle) < wanted) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}
