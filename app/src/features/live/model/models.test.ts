import { describe, expect, it } from 'vitest';
import { createStimulus, parseDevice, STIMULUS_NAMES } from '@benchlark/dsp';
import { gridWords } from './grid-words';
import {
  cappedLevelDbfs,
  DEFAULT_FORM,
  hasLevel,
  isTake,
  steadyTones,
  stimulusOptions,
  tonesOf,
} from './live-form';
import { NO_FAULTS, PRACTICE_UNITS, practiceDeviceOf } from './practice-faults';
import { takeFileName } from './take';
import { signalOf, SIGNALS } from './take-kinds';

describe('what can be played', () => {
  it('starts quietly, with a steady tone', () => {
    expect(DEFAULT_FORM).toMatchObject({ signalId: 'tone', levelDbfs: -20 });
    expect(isTake(DEFAULT_FORM)).toBe(false);
  });

  it('never goes beyond the rig’s limit', () => {
    expect(cappedLevelDbfs({ ...DEFAULT_FORM, levelDbfs: -1 }, -10)).toBe(-10);
    expect(cappedLevelDbfs({ ...DEFAULT_FORM, levelDbfs: -30 }, -10)).toBe(-30);
    const sweep = stimulusOptions({ ...DEFAULT_FORM, levelDbfs: 0 }, signalOf('sweep'), {
      sampleRateHz: 48_000,
      limitDbfs: -12,
    });
    expect(sweep.ceilingDbfs).toBe(-12);
  });

  it.each(SIGNALS.filter(({ stimulus }) => stimulus !== null))(
    '$id is a stimulus that can be made',
    (kind) => {
      expect(STIMULUS_NAMES).toContain(kind.stimulus);
      for (const channels of ['both', 'left'] as const) {
        const options = stimulusOptions({ ...DEFAULT_FORM, channels, levelDbfs: -1 }, kind, {
          sampleRateHz: 96_000,
          limitDbfs: -6,
        });
        expect(
          createStimulus(kind.stimulus!, { ...options, bitsPerSample: '32f' }).source.frameCount,
        ).toBeGreaterThan(0);
      }
    },
  );

  it('leaves the programme’s and the quiet tone’s own levels alone', () => {
    expect(SIGNALS.filter((kind) => !hasLevel(kind)).map(({ id }) => id)).toEqual([
      'idle',
      'low-level-tone',
      'jitter-test',
      'quick-programme',
      'programme',
    ]);
  });

  it('holds a pair to the peak of one tone, 4 to 1 (SMPTE RP 120)', () => {
    const [low, high] = steadyTones({ ...DEFAULT_FORM, signalId: 'pair' }, -20);
    expect(low!.peak / high!.peak).toBeCloseTo(4, 10);
    expect(low!.peak + high!.peak).toBeCloseTo(0.1, 10);
    expect(tonesOf({ ...DEFAULT_FORM, signalId: 'pair' })).toEqual([60, 7000]);
  });
});

describe('the practice device on plain controls', () => {
  it.each(PRACTICE_UNITS)('%s, with every fault there is, is one that dsp takes', (unit) => {
    const device = practiceDeviceOf({
      unit,
      clipDbfs: -2,
      secondHarmonicDb: -60,
      thirdHarmonicDb: -70,
      humDbfs: -80,
      noiseDbfs: -100,
    });
    expect(parseDevice(JSON.parse(JSON.stringify(device)))).toEqual(device);
  });

  it('puts a second harmonic of the size that was asked for on a full-scale tone: sin² holds half of it', () => {
    const device = practiceDeviceOf({ ...NO_FAULTS, secondHarmonicDb: -40 });
    expect(device.stages[0]).toEqual({ kind: 'polynomial', channel: 'both', coefficients: [1, 0.02, 0] });
  });

  it('adds nothing unless told to', () => {
    expect(practiceDeviceOf(NO_FAULTS).name).toBe('a unit without a fault');
    expect(practiceDeviceOf(NO_FAULTS).stages).toHaveLength(4);
  });
});

describe('words about an input', () => {
  it('say what 16 bits cost: LSB over √12 against a full-scale sine (IEEE Std 1241)', () => {
    const { short, cost } = gridWords({ kind: '16-bit', bits: 16, floorDbfs: -98.09 });
    expect(short).toBe('16 bits');
    expect(cost).toMatch(/nothing below about −98.dBFS can be seen/);
    expect(gridWords({ kind: 'float', bits: null, floorDbfs: null }).cost).toBeNull();
  });
});

describe('a take’s file', () => {
  it('is named by what and when, and says that it was practice', () => {
    expect(takeFileName('sweep', '2026-03-04T05:06:07.000Z', false)).toBe('sweep-2026-03-04-050607.wav');
    expect(takeFileName('sweep', '2026-03-04T05:06:07.000Z', true)).toBe(
      'practice-sweep-2026-03-04-050607.wav',
    );
  });
});
