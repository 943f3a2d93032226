import { describe, expect, it } from 'vitest';
import { decimal, readDecimal } from './decimal-field';
import { fullScaleSentence, toNewCalibration, voltsAtFullScale } from './full-scale';
import { calibrationSchema } from './rig-forms';

const reading = { direction: 'input', meterVrms: '3.52', levelDbfs: '0', dividerRatio: '1' } as const;
const plain = (text: string | null) => text?.replaceAll('\u00a0', ' ');

describe('the sum to full scale', () => {
  // A level in dB is 20 lg of the ratio of voltages (IEC 60027-3): -6.0206 dB is half, -20 dB a tenth.
  it.each([
    [2, 0, 2],
    [1, -20, 10],
    [0.5, -6.020599913, 1],
  ])('of %f V at %f dBFS is %f V', (meterVrms, levelDbfs, volts) => {
    // Seven digits: the level is given to nine.
    expect(voltsAtFullScale(meterVrms, levelDbfs)).toBeCloseTo(volts, 7);
  });

  // Ohm's law: behind a divider of ratio n stands 1/n of the voltage before it.
  it.each([
    [{}, '3.52 V RMS at the meter is 3.52 V at full scale.'],
    [{ dividerRatio: '10' }, '3.52 V RMS at the meter with a divider of 10 is 35.2 V at full scale.'],
    [
      { meterVrms: '0,352', levelDbfs: '\u221220' },
      '0.352 V RMS at the meter while the recording shows \u221220 dBFS is 3.52 V at full scale.',
    ],
    [
      { direction: 'output' as const, dividerRatio: '10' },
      '3.52 V RMS at the meter is 3.52 V at full scale; behind a divider of 10 the unit is given 0.352 V.',
    ],
  ])('is told in words for %j', (change, sentence) => {
    expect(plain(fullScaleSentence({ ...reading, ...change }))).toBe(sentence);
  });

  it.each([{ meterVrms: '' }, { meterVrms: '0' }, { levelDbfs: '1' }, { dividerRatio: '0.5' }])(
    'is not told for %j',
    (change) => {
      expect(fullScaleSentence({ ...reading, ...change })).toBeNull();
    },
  );

  it('is what the server is sent, the reading itself left out', () => {
    const values = calibrationSchema.parse({
      ...reading,
      meterVrms: '0.352',
      levelDbfs: '-20',
      dividerRatio: '10',
      channel: 'all',
      range: 'pad off',
      sampleRateHz: '96 000',
      frequencyHz: '997',
      loadOhm: '',
      meter: 'bench meter',
      meterUncertaintyPercent: '0.35',
      takenOn: '2026-11-02',
      validUntil: '2027-11-02',
      notes: '',
    });
    expect(toNewCalibration(values)).toEqual({
      direction: 'input',
      channel: 'all',
      range: 'pad off',
      sampleRateHz: 96_000,
      frequencyHz: 997,
      voltsRmsAtFullScale: 3.52,
      dividerRatio: 10,
      loadOhm: null,
      meter: 'bench meter',
      meterUncertaintyPercent: 0.35,
      takenOn: '2026-11-02',
      validUntil: '2027-11-02',
      notes: '',
    });
  });
});

describe('a number in a field', () => {
  it.each([
    ['3,52', 3.52],
    ['\u22126', -6],
    ['96\u202f000', 96_000],
    ['.5', 0.5],
    ['1e-3', 0.001],
    ['', null],
    ['3.5.2', null],
    ['four', null],
    ['0x10', null],
  ])('%j is read as %s', (text, value) => {
    expect(readDecimal(text)).toBe(value);
  });

  it('is refused outside its limits', () => {
    const field = decimal({ least: -1, most: 1 }, 'no');
    expect(field.safeParse('1').data).toBe(1);
    expect(field.safeParse('1.1').error?.issues[0]?.message).toBe('no');
    expect(field.safeParse('').success).toBe(false);
  });
});
