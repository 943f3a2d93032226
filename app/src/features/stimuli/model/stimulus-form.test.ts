import { STIMULUS_NAMES } from '@benchlark/dsp';
import { describe, expect, it } from 'vitest';
import { STIMULUS_GROUPS } from './stimulus-catalogue';
import { fileNameOf, readForm, refusedKey, withName, withWord } from './stimulus-form';

const read = (address: string) => readForm(new URLSearchParams(address));

describe('the catalogue', () => {
  it('holds every stimulus there is, each once', () => {
    const names = STIMULUS_GROUPS.flatMap(({ entries }) => entries.map(({ name }) => name));
    expect([...names].sort()).toEqual([...STIMULUS_NAMES].sort());
  });
});

describe('a stimulus in the address', () => {
  it('is the programme at 96 kHz and 24 bits unless it says otherwise', () => {
    expect(read('')).toEqual({ name: 'programme', options: { sampleRateHz: 96_000, bitsPerSample: 24 } });
    expect(read('name=nothing&rate=x&bits=7&level=loud').options).toEqual({
      sampleRateHz: 96_000,
      bitsPerSample: 24,
    });
  });

  it('carries every word of the sentence', () => {
    expect(
      read(
        'name=difference-pair&rate=44100&bits=16&level=-3&low=18000&high=20000&duration=7&bare=yes&channels=left&dither=none&ceiling=-6&seed=9',
      ),
    ).toEqual({
      name: 'difference-pair',
      options: {
        sampleRateHz: 44_100,
        bitsPerSample: 16,
        levelDbfs: -3,
        lowFrequencyHz: 18_000,
        highFrequencyHz: 20_000,
        durationS: 7,
        isBare: true,
        channels: 'left',
        dither: 'none',
        ceilingDbfs: -6,
        seed: 9,
      },
    });
  });

  it('keeps the file’s form, and not the signal’s, when another is chosen', () => {
    const next = withName(
      new URLSearchParams('name=sine&rate=48000&bits=16&level=-6&frequency=100'),
      'sweep',
    );
    expect(next.toString()).toBe('name=sweep&rate=48000&bits=16');
    expect(withWord(next, 'level', '-20').get('level')).toBe('-20');
    expect(withWord(next, 'rate', null).has('rate')).toBe(false);
  });

  it('asks for the quick form only where there is one', () => {
    expect(read('name=programme&form=quick').options.isQuick).toBe(true);
    expect(read('name=sine&form=quick').options.isQuick).toBeUndefined();
  });

  it('names its file', () => {
    expect(fileNameOf(read('name=programme&form=quick&rate=44100&bits=16'))).toBe(
      'programme-quick-44_1k-16bit.wav',
    );
    expect(fileNameOf(read('name=difference-pair&level=-6&low=18000&duration=2'))).toBe(
      'difference-pair-96k-24bit-18000-20000hz-minus6db-2s.wav',
    );
    expect(fileNameOf(read('name=sweep&bits=32f&bare=yes'))).toBe('sweep-96k-float-bare.wav');
  });
});

describe('a refusal', () => {
  it.each([
    ['the level must be from -160 to 0 dBFS, not 3', 'level'],
    ['the high frequency must be above the low one of 60 Hz, not 50', 'high'],
    ['the sample rate must be a whole number', 'rate'],
    ['something else', null],
  ])('%s belongs to %s', (message, key) => {
    expect(refusedKey(message)).toBe(key);
  });
});
