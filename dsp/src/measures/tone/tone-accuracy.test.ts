import { describe, expect, it } from 'vitest';
import { createRandom } from '../../random/create-random.js';
import { bend, clip, mix, quantise, sine, synthesise, whiteNoise } from '../../testing/signals.js';
import { analyseSamples, numberOf } from '../testing/analyse-samples.js';
import { toneMeasure } from './tone-measure.js';

const analyse = (samples: Float64Array, rate: number, options = {}) =>
  analyseSamples(toneMeasure, [samples], rate, options).then(({ channels }) => channels[0]);

describe('tones anywhere', () => {
  // Closed form: the tone is given. 0.001 dB is the tolerance for signals without noise (docs/record.md).
  it.each([44100, 48000, 88200, 96000, 176400, 192000])(
    'reads 30 random tones at a rate of %i Hz',
    async (rate) => {
      const random = createRandom(rate);
      for (let draw = 0; draw < 30; draw++) {
        const frequencyHz = 20 * ((0.45 * rate) / 20) ** random();
        const amplitude = 10 ** (-2 * random());
        const length = Math.round(rate * Math.max(0.4, 90 / frequencyHz));
        const left = await analyse(sine(length, rate, frequencyHz, amplitude, 6 * random()), rate);
        expect(Math.abs(numberOf(left, 'fundamentalFrequencyHz') / frequencyHz - 1)).toBeLessThan(1e-9);
        expect(numberOf(left, 'fundamentalLevelDbfs')).toBeCloseTo(20 * Math.log10(amplitude), 3);
        expect(numberOf(left, 'sinadDb')).toBeGreaterThan(140);
      }
    },
  );

  it.each([20, 0.45 * 48000])('reads a tone of %f Hz at the ends of the range', async (frequencyHz) => {
    const left = await analyse(sine(48000 * 6, 48000, frequencyHz, 0.5, 1), 48000);
    expect(numberOf(left, 'fundamentalFrequencyHz')).toBeCloseTo(frequencyHz, 6);
    expect(numberOf(left, 'fundamentalLevelDbfs')).toBeCloseTo(20 * Math.log10(0.5), 3);
    expect(numberOf(left, 'thdPlusNoiseDb')).toBeLessThan(-140);
  });
});

describe('harmonics', () => {
  // C-4.2 (closed form): H2 -100 dB, H3 -110.4576 dB, at any clock offset.
  it.each([0, 10, 100, 200, -200])('reads them alike with the clock off by %i ppm', async (ppm) => {
    const f = 997 * (1 + ppm * 1e-6);
    const partials = [
      { frequencyHz: f, amplitude: 0.9 },
      { frequencyHz: 2 * f, amplitude: 0.9e-5 },
      { frequencyHz: 3 * f, amplitude: 0.9 * 3e-6 },
    ];
    const left = await analyse(synthesise(48000 * 6, 48000, partials), 48000);
    expect(left.harmonics[0].levelDbr).toBeCloseTo(-100, 3);
    expect(left.harmonics[1].levelDbr).toBeCloseTo(-110.4576, 3);
  });

  // C-5.1 (closed form): amplitudes 1, 0.1, 0.05, 0.02 give THD_F 0.1135782 = -18.8940 dB.
  it('adds them up as a root of squares against the fundamental', async () => {
    const partials = [1, 0.1, 0.05, 0.02].map((size, index) => ({
      frequencyHz: 1000.7 * (index + 1),
      amplitude: 0.5 * size,
      phaseRad: index,
    }));
    const left = await analyse(synthesise(48000 * 3, 48000, partials), 48000);
    expect(numberOf(left, 'thdDb')).toBeCloseTo(-18.894, 3);
    expect(numberOf(left, 'thdPercent')).toBeCloseTo(11.35782, 4);
    // THD+N against the total: 0.1135782 / sqrt(1 + 0.1135782²) = 0.1128526 (C-5.1, THD_R).
    expect(numberOf(left, 'thdPlusNoisePercent')).toBeCloseTo(11.28526, 4);
  });

  // C-5.2 and C-5.3 (closed form), tone at 1361.37 bins of 65,536 at 48 kHz. Phases: section 5, "Harmonic phase".
  it.each([
    { coefficients: [1, 1e-3], order: 2, levelDb: -66.0206, phaseDeg: -90 },
    { coefficients: [1, 0, 1e-3], order: 3, levelDb: -72.0477, phaseDeg: 180 },
  ])(
    'reads order $order of a bent sine, with its phase',
    async ({ coefficients, order, levelDb, phaseDeg }) => {
      const tone = sine(65536 * 2, 48000, (1361.37 * 48000) / 65536, 1, 0.7);
      const left = await analyse(bend(tone, coefficients), 48000);
      const harmonic = left.harmonics.find((entry) => entry.order === order)!;
      expect(harmonic.levelDbr).toBeCloseTo(levelDb, 3);
      const off = ((((harmonic.phaseDeg! - phaseDeg) % 360) + 540) % 360) - 180;
      expect(Math.abs(off)).toBeLessThan(0.01);
      // An inverting stage leaves odd orders and turns even ones by 180° (section 5).
      const inverted = await analyse(
        bend(tone, coefficients).map((x) => -x),
        48000,
      );
      const turned =
        (((inverted.harmonics.find((entry) => entry.order === order)!.phaseDeg! - phaseDeg) % 360) + 360) %
        360;
      expect(Math.min(turned, 360 - turned)).toBeCloseTo(order === 2 ? 180 : 0, 2);
    },
  );

  it('finds one 120 dB down in 24 bits', async () => {
    const partials = [
      { frequencyHz: 997.37, amplitude: 0.891, phaseRad: 0.3 },
      { frequencyHz: 3 * 997.37, amplitude: 0.891e-6, phaseRad: 1 },
    ];
    const samples = quantise(synthesise(48000 * 6, 48000, partials), 24, createRandom(5));
    const left = await analyse(samples, 48000, { bits: 24 });
    // 24 dB above the noise in its lobe: 0.05 dB is the tolerance with random noise (section 0.3).
    expect(Math.abs(left.harmonics[1].levelDbr! + 120)).toBeLessThan(0.05);
  });

  it('are null below the noise, and THD is then bounded', async () => {
    const left = await analyse(mix(sine(48000 * 3, 48000, 997, 0.5), whiteNoise(48000 * 3, 1e-3, 3)), 48000, {
      highestHarmonic: 3,
    });
    expect(left.figures['thdDb']).toBeNull();
    expect(left.limits['thdDb'].by).toBe('noise');
    expect(left.limits['thdDb'].below).toBeLessThan(-80);
  });
});

describe('noise', () => {
  // C-5.4 (powers added, in closed form): -96.8866 dB, random noise tolerance 0.05 dB.
  it('adds to a harmonic as THD+N', async () => {
    const amplitude = 10 ** (-1 / 20);
    const rms = Math.SQRT1_2 * 1e-5;
    const partials = [
      { frequencyHz: 997, amplitude },
      { frequencyHz: 1994, amplitude: amplitude * 1e-5 },
    ];
    const left = await analyse(
      mix(synthesise(48000 * 20, 48000, partials), whiteNoise(48000 * 20, rms, 8)),
      48000,
    );
    expect(Math.abs(numberOf(left, 'thdPlusNoiseDb') + 96.8866)).toBeLessThan(0.05);
    // C-5.4's noise: -100 dBFS over 0 to 24 kHz is -100.795 dBFS in 19,980 Hz; A -2.048 dB, CCIR-RMS +1.671 dB (section 6).
    expect(Math.abs(numberOf(left, 'noiseDbfs') + 100.796)).toBeLessThan(0.05);
    expect(Math.abs(numberOf(left, 'noiseAWeightedDbfs') + 102.844)).toBeLessThan(0.1);
    expect(Math.abs(numberOf(left, 'noiseItu468RmsDbfs') + 99.125)).toBeLessThan(0.1);
  });

  // Section 14's table: 16 bits, triangular dither, 48 kHz: -94.115 dBFS in 20 Hz to 20 kHz.
  it('of 16 bits is told as quantisation', async () => {
    const samples = quantise(sine(48000 * 5, 48000, 997, 0.9), 16, createRandom(1));
    const left = await analyse(samples, 48000, { bits: 16 });
    expect(Math.abs(numberOf(left, 'noiseDbfs') + 94.115)).toBeLessThan(0.1);
    expect(left.limits['noiseDbfs'].by).toBe('quantisation');
    expect(Math.abs(left.limits['noiseDbfs'].floor! + 94.115)).toBeLessThan(0.01);
    const { expanded } = left.uncertainty['noiseDbfs'];
    expect(expanded).toBeGreaterThan(0.005);
    expect(Math.abs(numberOf(left, 'noiseDbfs') + 94.115)).toBeLessThan(2 * expanded);
  });

  // C-5.5: SINAD 98.0905 dB is 16.0000 bits (IEEE Std 1241's line; constants computed).
  it('gives effective bits from SINAD alone', async () => {
    const left = await analyse(mix(sine(48000 * 3, 48000, 997, 0.5), whiteNoise(48000 * 3, 1e-4, 2)), 48000);
    expect(numberOf(left, 'enobBits')).toBeCloseTo(16 + (numberOf(left, 'sinadDb') - 98.0905) / 6.0206, 4);
  });
});

describe('hard cases', () => {
  it('reads a quarter of a second', async () => {
    const left = await analyse(
      mix(sine(12000, 48000, 1234.5, 0.5, 2), sine(12000, 48000, 2469, 0.5e-4)),
      48000,
    );
    expect(numberOf(left, 'fundamentalLevelDbfs')).toBeCloseTo(-6.0206, 3);
    expect(numberOf(left, 'thdDb')).toBeCloseTo(-80, 3);
  });

  it('reads a low tone beside hum, with an offset', async () => {
    const partials = [
      { frequencyHz: 41.3, amplitude: 0.25 },
      { frequencyHz: 2 * 41.3, amplitude: 0.25e-4 },
      { frequencyHz: 50.02, amplitude: 1e-3 },
      { frequencyHz: 150.06, amplitude: 5e-4 },
    ];
    const record = await analyseSamples(toneMeasure, [synthesise(48000 * 8, 48000, partials, 0.02)], 48000);
    const [left] = record.channels;
    expect(numberOf(left, 'fundamentalLevelDbfs')).toBeCloseTo(-12.0412, 3);
    expect(left.harmonics[0].levelDbr).toBeCloseTo(-80, 2);
    // Closed form: the residual is hum and harmonic, all in power.
    const residual = 10 * Math.log10(1e-6 + 25e-8 + 0.0625e-8);
    expect(numberOf(left, 'sinadDb')).toBeCloseTo(-12.0412 - residual, 2);
    expect(numberOf(left, 'dcOffsetDbfs')).toBeCloseTo(20 * Math.log10(0.02), 1);
    expect(record.warnings.map(({ code }) => code)).toEqual(
      expect.arrayContaining(['hum-in-residual', 'dc-offset']),
    );
  });

  it('keeps to the true peak of a tone between its samples', async () => {
    // EBU Tech 3341 (2023), case 15's signal: fs/4 at 45° reads +3.01 dB above its samples (tolerance +0.2/-0.4 dB there).
    const left = await analyse(sine(48000 * 2, 48000, 12000, 0.5, Math.PI / 4), 48000);
    expect(numberOf(left, 'samplePeakDbfs')).toBeCloseTo(-9.0309, 3);
    expect(numberOf(left, 'truePeakDbtp')).toBeGreaterThan(-6.0206 - 0.4);
    expect(numberOf(left, 'truePeakDbtp')).toBeLessThan(-6.0206 + 0.2);
  });

  it('states a clipped recording and limits its figures by it', async () => {
    const record = await analyseSamples(
      toneMeasure,
      [quantise(clip(sine(96000, 48000, 997, 1.05), -1, 1), 24)],
      48000,
      { bits: 24 },
    );
    expect(record.warnings.map(({ code }) => code)).toContain('recording-overloaded');
    expect(record.channels[0].limits['thdDb'].by).toBe('overload');
    const whole = await analyseSamples(toneMeasure, [quantise(sine(192000, 48000, 21, 1), 16)], 48000, {
      bits: 16,
    });
    expect(whole.warnings.map(({ code }) => code)).not.toContain('recording-overloaded');
  });
});
