import { dbToRatio } from '../../level/decibel.js';

/** Passes one sample through a memoryless device. */
export type Bend = (sample: number) => number;

/** Σ coefficients[k] · x^(k+1), by Horner's rule. */
export function bendByPolynomial(coefficients: readonly number[]): Bend {
  const highest = coefficients.length - 1;
  return (sample) => {
    let sum = coefficients[highest];
    for (let k = highest - 1; k >= 0; k--) sum = sum * sample + coefficients[k];
    return sum * sample;
  };
}

/** Holds samples between -negative and +positive. */
export function bendByClip(positive: number, negative: number): Bend {
  return (sample) => Math.min(positive, Math.max(-negative, sample));
}

function softenHalf(limit: number, kneeDb: number): Bend {
  const knee = limit * dbToRatio(-kneeDb);
  const room = limit - knee;
  return (magnitude) => {
    if (magnitude <= knee) return magnitude;
    return room > 0 ? knee + room * Math.tanh((magnitude - knee) / room) : limit;
  };
}

/**
 * Clips softly: each half is straight up to t = limit · 10^(-kneeDb/20), and from there on
 * t + (limit - t) · tanh((|x| - t) / (limit - t)): slope and curvature go on without a step at t, and the limit is
 * only neared. kneeDb = 0 is the hard clip.
 */
export function bendBySoftClip(positive: number, negative: number, kneeDb: number): Bend {
  const upper = softenHalf(positive, kneeDb);
  const lower = softenHalf(negative, kneeDb);
  return (sample) => (sample >= 0 ? upper(sample) : -lower(-sample));
}

/** Crossover: x less its part within ±width. */
export function bendByDeadZone(width: number): Bend {
  return (sample) => sample - Math.min(width, Math.max(-width, sample));
}
