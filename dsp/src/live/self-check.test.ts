import { describe, expect, it } from 'vitest';
import type { PracticeStage } from '../practice/device.js';
import { pass } from '../practice/testing/pass.js';
import { whiteNoise } from '../testing/signals.js';
import { readSelfCheck, renderSelfCheck } from './self-check.js';

const RATE_HZ = 48_000;
const delay: PracticeStage = { kind: 'delay', channel: 'both', samples: 2640 };

/** As a rig has it: so many frames later, into a longer recording, in noise. */
function check(stages: readonly PracticeStage[], isSwapped = false) {
  const sent = renderSelfCheck(RATE_HZ).map((samples) => {
    const longer = new Float64Array(3 * RATE_HZ);
    longer.set(samples);
    return longer;
  });
  const noise: PracticeStage = { kind: 'noise', channel: 'both', levelDbfs: -80 };
  const [left, right] = pass(sent, RATE_HZ, [delay, ...stages, noise]);
  return readSelfCheck(isSwapped ? [right, left] : [left, right], RATE_HZ);
}

describe('a rig’s check of itself', () => {
  it('tells level, channel, polarity and latency', () => {
    const result = check([
      { kind: 'gain', channel: 'left', gainDb: -3 },
      { kind: 'polarity', channel: 'right' },
    ]);
    // What the practice device was told: -3 dB, inverted, 2,640 frames are 55 ms.
    expect(result.left).toMatchObject({ input: 'left', polarity: 'same', latencyS: 0.055 });
    expect(result.left.gainDb).toBeCloseTo(-3, 1);
    expect(result.right).toMatchObject({ input: 'right', polarity: 'inverted', latencyS: 0.055 });
    expect(result.right.gainDb).toBeCloseTo(0, 1);
  });

  it('finds what comes back late: 0.8 s through a slow system', () => {
    const { left, right } = check([{ kind: 'delay', channel: 'both', samples: 0.745 * RATE_HZ }]);
    expect(left).toMatchObject({ input: 'left', latencyS: 0.8 });
    expect(right).toMatchObject({ input: 'right', latencyS: 0.8 });
  });

  it('tells exchanged and joined channels', () => {
    const swapped = check([], true);
    expect([swapped.left.input, swapped.right.input]).toEqual(['right', 'left']);
    const joined = check([{ kind: 'crosstalk', channel: 'both', levelDb: 0, slopeDbPerOctave: 0 }]);
    expect([joined.left.input, joined.right.input]).toEqual(['both', 'both']);
  });

  it('finds nothing where nothing comes back', () => {
    const noise = [whiteNoise(3 * RATE_HZ, 0.01, 1), whiteNoise(3 * RATE_HZ, 0.01, 2)];
    const nothing = { input: null, gainDb: null, polarity: null, latencyS: null };
    expect(readSelfCheck(noise, RATE_HZ)).toEqual({ left: nothing, right: nothing });
    const silence = [new Float64Array(3 * RATE_HZ), new Float64Array(3 * RATE_HZ)];
    expect(readSelfCheck(silence, RATE_HZ)).toEqual({ left: nothing, right: nothing });
    expect(check([{ kind: 'gain', channel: 'right', gainDb: -120 }]).right).toEqual(nothing);
  });
});
