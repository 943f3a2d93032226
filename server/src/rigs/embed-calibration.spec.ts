import { parseCalibration } from '@benchlark/dsp';
import { calibrationState } from './calibration-state';
import { embedCalibration, fullScaleVrms, isFollowedBy, type CalibrationFacts } from './embed-calibration';

const facts: CalibrationFacts = {
  channel: 'all',
  direction: 'input',
  range: 'pad off',
  sampleRateHz: 96_000,
  voltsRmsAtFullScale: 3.52,
  dividerRatio: 10,
  meterUncertaintyPercent: 0.5,
  takenOn: '2026-05-04',
};

describe('fullScaleVrms', () => {
  // Ohm's law: a divider of ratio n leaves 1/n of the voltage behind it.
  it('counts the divider in: before an input up, behind an output down', () => {
    expect(fullScaleVrms(facts)).toBe(35.2);
    expect(fullScaleVrms({ ...facts, direction: 'output' })).toBe(0.352);
    expect(fullScaleVrms({ ...facts, dividerRatio: 1 })).toBe(3.52);
  });
});

describe('embedCalibration', () => {
  it('gives what dsp reads as a calibration, word for word', () => {
    const embedded = embedCalibration([facts]);
    expect(embedded).toEqual({
      schema: 'benchlark-calibration/1',
      date: '2026-05-04',
      sampleRateHz: 96_000,
      inputRange: 'pad off',
      channels: [
        { channel: 'left', fullScaleVrms: 35.2, expandedPercent: 0.5 },
        { channel: 'right', fullScaleVrms: 35.2, expandedPercent: 0.5 },
      ],
    });
    expect(parseCalibration(JSON.parse(JSON.stringify(embedded)))).toEqual(embedded);
  });

  it('puts left before right, whichever was chosen, under the older date', () => {
    const left = { ...facts, channel: 'left', takenOn: '2026-05-06' } as const;
    const right = { ...facts, channel: 'right', voltsRmsAtFullScale: 3.5 } as const;
    expect(embedCalibration([right, left])).toEqual(embedCalibration([left, right]));
    expect(embedCalibration([right, left])).toMatchObject({
      date: '2026-05-04',
      channels: [
        { channel: 'left', fullScaleVrms: 35.2 },
        { channel: 'right', fullScaleVrms: 35 },
      ],
    });
    expect(embedCalibration([right]).channels.map(({ channel }) => channel)).toEqual(['right']);
  });
});

describe('the state of a calibration', () => {
  it.each([
    ['2026-11-30', null, 'valid'],
    ['2026-12-01', null, 'expired'],
    ['2026-11-30', new Date(), 'retired'],
  ])('on %s, retired at %s, is %s', (day, retiredAt, state) => {
    expect(calibrationState({ validUntil: '2026-11-30', retiredAt }, day)).toBe(state);
  });

  it('is followed by a newer one of the same channel and setting alone', () => {
    const at = (ms: number) => new Date(ms);
    const one = { ...facts, createdAt: at(1) };
    expect(isFollowedBy(one, { ...one, createdAt: at(2) })).toBe(true);
    expect(isFollowedBy(one, one)).toBe(false);
    expect(isFollowedBy(one, { ...one, takenOn: '2026-06-01', createdAt: at(0) })).toBe(true);
    for (const other of [{ range: 'pad on' }, { sampleRateHz: 48_000 }, { channel: 'left' as const }]) {
      expect(isFollowedBy(one, { ...one, ...other, createdAt: at(2) })).toBe(false);
    }
  });
});
