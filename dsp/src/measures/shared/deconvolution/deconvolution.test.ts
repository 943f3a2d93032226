import { describe, expect, it } from 'vitest';
import { pass } from '../../../practice/testing/pass.js';
import { planSweep, renderSweep, sweepDurationS } from '../../../stimulus/sweep-signal.js';
import { createDeconvolver, type ImpulseResponse } from './create-deconvolver.js';
import { transformCut } from './frequency-response.js';

const RATE_HZ = 96_000;
const LEAD_S = 0.2;
const sweep = planSweep(10, 45_000, 5, { fadeInS: 0.2, fadeOutS: 0.03 });

/** A chain's response whose delay is known to be none. */
function respond(chain: (samples: Float64Array) => Float64Array, peak: number): ImpulseResponse {
  const frames = Math.ceil((LEAD_S + sweepDurationS(sweep) + 0.6) * RATE_HZ);
  const sent = new Float64Array(frames);
  renderSweep(sweep, -LEAD_S, 1 / RATE_HZ, sent);
  const options = { sweep, speed: 1, sampleRateHz: RATE_HZ, leadS: LEAD_S, frameCount: frames };
  return createDeconvolver(options).deconvolve(chain(sent.map((x) => peak * x)));
}

function readAt(impulse: ImpulseResponse, order: number, fundamentalHz: number) {
  const centreS = -sweep.rateS * Math.log(order);
  const cut = transformCut(impulse, { centreS, beforeS: 0.08, afterS: 0.08 }, 2 ** 19);
  const k = Math.round((order * fundamentalHz) / cut.binWidthHz);
  return {
    level: Math.hypot(cut.re[k], cut.im[k]),
    phaseDeg: (Math.atan2(cut.im[k], cut.re[k]) * 180) / Math.PI,
  };
}

describe('dividing by the sweep as it was sent', () => {
  // Powers of a sine by multiple angles, y = u + 0.01 u² + 0.02 u³ at a peak of 0.5: closed form.
  it('gives harmonics their levels and phases', () => {
    const bent = respond((u) => u.map((x) => x + 0.01 * x ** 2 + 0.02 * x ** 3), 0.5);
    for (const [order, amplitude, phaseDeg] of [
      [1, 0.501875, 0],
      [2, 0.00125, -90],
      [3, 0.000625, 180],
    ]) {
      for (const hz of [200, 1000, 5000]) {
        const read = readAt(bent, order, hz);
        expect(Math.abs(20 * Math.log10(read.level / amplitude))).toBeLessThan(0.01);
        const off = read.phaseDeg - phaseDeg;
        expect(Math.abs(off - 360 * Math.round(off / 360))).toBeLessThan(0.05);
      }
    }
  });

  // 1 / (1 + j tan(πf/fs)/tan(πf0/fs)), one pole by the bilinear transform: closed form, -3.0103 dB and -45° at its corner.
  it.each([100, 1000, 10_000])('gives a pole at 1 kHz its level and phase at %d Hz', (hz) => {
    const stage = { kind: 'filter', channel: 'both', type: 'low-pass', frequencyHz: 1000, order: 1 } as const;
    const impulse = respond((samples) => pass([samples], RATE_HZ, [stage])[0], 1);
    const { binWidthHz } = transformCut(impulse, { centreS: 0, beforeS: 0.08, afterS: 0.08 }, 2 ** 19);
    const f = Math.round(hz / binWidthHz) * binWidthHz;
    const ratio = Math.tan((Math.PI * f) / RATE_HZ) / Math.tan((Math.PI * 1000) / RATE_HZ);
    const { level, phaseDeg } = readAt(impulse, 1, hz);
    expect(Math.abs(20 * Math.log10(level) + 10 * Math.log10(1 + ratio ** 2))).toBeLessThan(0.01);
    expect(Math.abs(phaseDeg + (Math.atan(ratio) * 180) / Math.PI)).toBeLessThan(0.05);
  });
});
