import { dbToRatio } from '../../level/decibel.js';
import type { FilterStage } from '../device.js';
import type { Biquad } from './biquad.js';

const DEFAULT_ORDER = 2;

function overA0(b: readonly [number, number, number], a: readonly [number, number, number]): Biquad {
  return { b0: b[0] / a[0], b1: b[1] / a[0], b2: b[2] / a[0], a1: a[1] / a[0], a2: a[2] / a[0] };
}

/** First-order section by the bilinear transform, its corner held at its place. */
function firstOrder(turn: number, isHigh: boolean): Biquad {
  const k = Math.tan(turn / 2);
  const b: [number, number, number] = isHigh ? [1, -1, 0] : [k, k, 0];
  return overA0(b, [1 + k, k - 1, 0]);
}

function secondOrder(turn: number, q: number, isHigh: boolean): Biquad {
  const cos = Math.cos(turn);
  const alpha = Math.sin(turn) / (2 * q);
  const edge = isHigh ? (1 + cos) / 2 : (1 - cos) / 2;
  return overA0([edge, isHigh ? -2 * edge : 2 * edge, edge], [1 + alpha, -2 * cos, 1 - alpha]);
}

function designPass(stage: FilterStage, turn: number): Biquad[] {
  const order = stage.order ?? DEFAULT_ORDER;
  const isHigh = stage.type === 'high-pass';
  const pairs = Array.from({ length: Math.floor(order / 2) }, (_, k) => {
    // Butterworth's poles lie evenly on a circle; each pair's Q follows from its angle.
    const butterworthQ = 1 / (2 * Math.cos(((2 * k + 1 + (order % 2)) * Math.PI) / (2 * order)));
    return secondOrder(turn, stage.q ?? butterworthQ, isHigh);
  });
  return order % 2 === 1 ? [...pairs, firstOrder(turn, isHigh)] : pairs;
}

function designPeak(turn: number, q: number, amplitude: number): Biquad {
  const alpha = Math.sin(turn) / (2 * q);
  const middle = -2 * Math.cos(turn);
  return overA0(
    [1 + alpha * amplitude, middle, 1 - alpha * amplitude],
    [1 + alpha / amplitude, middle, 1 - alpha / amplitude],
  );
}

function designShelf(turn: number, q: number, amplitude: number, isHigh: boolean): Biquad {
  // A high shelf is the low shelf mirrored at a quarter of the rate: the cosine and the odd terms change sign.
  const sign = isHigh ? -1 : 1;
  const cos = sign * Math.cos(turn);
  const slope = (2 * Math.sqrt(amplitude) * Math.sin(turn)) / (2 * q);
  const up = amplitude + 1;
  const down = amplitude - 1;
  return overA0(
    [
      amplitude * (up - down * cos + slope),
      sign * 2 * amplitude * (down - up * cos),
      amplitude * (up - down * cos - slope),
    ],
    [up + down * cos + slope, sign * -2 * (down + up * cos), up + down * cos - slope],
  );
}

/**
 * Designs a filter stage as a chain of second-order sections by the bilinear transform, its frequency held at its place:
 * at f the chain does what the analogue prototype does at f0 · tan(πf/fs) / tan(πf0/fs).
 *
 * @param sampleRateHz - above twice the stage's frequency
 * @returns the sections in order; a low or high pass of order n has ⌈n/2⌉
 * @see R. Bristow-Johnson, "Cookbook formulae for audio EQ biquad filter coefficients", published as a W3C note, 2021
 */
export function designFilter(stage: FilterStage, sampleRateHz: number): Biquad[] {
  const turn = (2 * Math.PI * stage.frequencyHz) / sampleRateHz;
  const q = stage.q ?? Math.SQRT1_2;
  const amplitude = dbToRatio((stage.gainDb ?? 0) / 2);
  switch (stage.type) {
    case 'low-pass':
    case 'high-pass':
      return designPass(stage, turn);
    case 'peak':
      return [designPeak(turn, q, amplitude)];
    case 'shelf':
      return [designShelf(turn, q, amplitude, stage.side !== 'low')];
  }
}
