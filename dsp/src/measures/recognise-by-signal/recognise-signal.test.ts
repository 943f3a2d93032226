import { describe, expect, it } from 'vitest';
import type { PracticeStage } from '../../practice/device.js';
import { pass } from '../../practice/testing/pass.js';
import { createGaussian } from '../../random/create-gaussian.js';
import { createRandom } from '../../random/create-random.js';
import { openMemorySource } from '../../source/open-memory-source.js';
import { createStimulus } from '../../stimulus/create-stimulus.js';
import { synthesise } from '../../testing/signals.js';
import { recognise } from '../recognise.js';

async function bare(name: string, rate: number, stages: readonly PracticeStage[] = []) {
  const { source } = createStimulus(name, { sampleRateHz: rate, bitsPerSample: 24, isBare: true });
  const stagesAll: PracticeStage[] = [
    ...stages,
    { kind: 'lead', channel: 'both', seconds: 0.4 },
    { kind: 'noise', channel: 'both', levelDbfs: -95 },
  ];
  return openMemorySource(pass(await source.read(0, source.frameCount), rate, stagesAll), rate);
}

const STAGES: readonly PracticeStage[] = [
  { kind: 'gain', channel: 'both', gainDb: -7 },
  { kind: 'clock', channel: 'both', ppm: 90 },
  { kind: 'hum', channel: 'both', frequencyHz: 50, levelsDbfs: [-85, -92] },
  { kind: 'polynomial', channel: 'both', coefficients: [1, 1e-4, 1e-4] },
];

describe('a bare stimulus is told by its signal', () => {
  it.each([
    ['sine', 'tone'],
    ['low-level-tone', 'dynamic-range'],
    ['level-steps', 'level-steps'],
    ['sweep', 'sweep'],
    ['modulation-pair', 'two-tone'],
    ['difference-pair', 'two-tone'],
    ['modulation-steps', 'two-tone-steps'],
    ['difference-steps', 'two-tone-steps'],
    ['multitone', 'multitone'],
    ['jitter-test', 'jitter'],
    ['intersample-tone', 'intersample'],
    ['white-noise', 'filter'],
    ['pink-noise', 'loudness'],
  ])('%s as %s', async (name, measure) => {
    for (const [rate, stages] of [
      [48_000, []],
      [44_100, STAGES],
    ] as const) {
      const found = await recognise(await bare(name, rate, stages));
      expect(found).toMatchObject({ measure, stimulusName: null });
      expect(found.why.length).toBeGreaterThan(15);
    }
  });
});

describe('what is none of these counts as music', () => {
  const RATE_HZ = 48_000;

  it('a chord of four notes with a bass', async () => {
    const notes = [110, 261.6, 329.6, 392].map((frequencyHz, k) => ({
      frequencyHz,
      amplitude: 0.1 + 0.02 * k,
    }));
    const samples = synthesise(6 * RATE_HZ, RATE_HZ, notes);
    await expect(recognise(openMemorySource([samples], RATE_HZ))).resolves.toMatchObject({
      measure: 'loudness',
    });
  });

  it('short rising calls, as of a bird', async () => {
    const samples = Float64Array.from({ length: 6 * RATE_HZ }, (_, n) => {
      const t = (n / RATE_HZ) % 0.4;
      return t < 0.2 ? 0.3 * Math.sin(2 * Math.PI * (2000 * t + 8000 * t * t)) : 0;
    });
    const found = await recognise(openMemorySource([samples], RATE_HZ));
    expect(found.measure).not.toBe('sweep');
  });

  it('noise in bursts through a filter', async () => {
    const gaussian = createGaussian(createRandom(5));
    let held = 0;
    const samples = Float64Array.from({ length: 8 * RATE_HZ }, (_, n) => {
      held += 0.05 * (gaussian() - held);
      return 0.6 * held * (0.3 + 0.7 * Math.abs(Math.sin((2 * Math.PI * n) / (0.7 * RATE_HZ))));
    });
    await expect(recognise(openMemorySource([samples], RATE_HZ))).resolves.toMatchObject({
      measure: 'loudness',
    });
  });
});
