import { describe, expect, it } from 'vitest';
import { describeFigure, FIGURE_KEYS } from './figures';
import { formatFigure, formatFigureLine } from './format/figure';
import { worthOfFigure } from './worth';

const settings = { bandLowHz: 20, bandHighHz: 20000, highestHarmonic: 10 };
const limit = (over: object) => ({
  by: 'rig' as const,
  floor: -120,
  marginDb: 30,
  low: null,
  high: null,
  below: null,
  ...over,
});

describe('the catalogue', () => {
  it('knows every key that a measure of the contract may give', () => {
    const contract =
      'fundamentalFrequencyHz fundamentalLevelDbfs thdDb thdPercent thdPlusNoiseDb thdPlusNoisePercent sinadDb snrDb enobBits noiseDbfs noiseAWeightedDbfs noiseItu468RmsDbfs samplePeakDbfs truePeakDbtp crestFactorDb dcOffsetDbfs mainsFrequencyHz humDbfs dynamicRangeDb dynamicRangeAWeightedDb dynamicRangeItu468RmsDb ' +
      'lowToneFrequencyHz highToneFrequencyHz lowToneLevelDbfs highToneLevelDbfs modulationDistortionDb modulationDistortionPercent differenceD2Db differenceD3Db differenceDistortionDb linearDownToDbfs maxDeviationDb fullScaleGainErrorDb flatnessDb minus3DbLowHz minus3DbHighHz levelAt20HzDb levelAt20kHzDb noiseAndDistortionDb separationLeftToRightAt1kHzDb separationRightToLeftAt1kHzDb separationLeftToRightAt10kHzDb separationRightToLeftAt10kHzDb balanceDb interchannelDelayS interchannelPolarity jitterPeakToPeakPs jitterRmsPs levelErrorDb passBandRippleDb imageRejectionDb integratedLufs loudnessRangeLu peakToLoudnessRatioDb clippedRunCount clockOffsetPpm';
    expect([...FIGURE_KEYS].sort()).toEqual(contract.split(' ').sort());
  });

  it('shows a delay between channels in microseconds', () => {
    expect(formatFigureLine('interchannelDelayS', { value: -1.204e-6 })).toBe('\u22121.20\u00a0\u00b5s');
  });

  it('gives conditions in words', () => {
    expect(describeFigure('thdDb').conditions({ settings })).toBe('harmonics 2 to 10');
    expect(describeFigure('noiseDbfs').conditions({ settings })).toBe('20\u00a0Hz to 20\u00a0kHz');
  });

  it('derives the calibrated twins and reads unknown keys by their ending', () => {
    expect(describeFigure('noiseV')).toMatchObject({ label: 'Noise', unit: 'V', kind: 'noise' });
    expect(describeFigure('fundamentalLevelDbv')).toMatchObject({ label: 'Level', unit: 'dBV' });
    expect(describeFigure('clockOffsetPpm')).toMatchObject({ label: 'Clock offset', unit: 'ppm' });
  });
});

describe('formatFigure', () => {
  it('ends where the uncertainty ends and keeps ± above nothing', () => {
    expect(formatFigure('thdDb', { value: -108.83, uncertainty: { expanded: 0.9 } })).toMatchObject({
      integer: '\u2212108',
      fraction: '.8',
      plusMinus: '±0.9',
    });
    expect(formatFigure('thdDb', { value: -35.2, uncertainty: { expanded: 0.0001 } }).plusMinus).toBe(
      '±0.01',
    );
  });

  it('writes two significant digits of a percentage of any size', () => {
    expect(formatFigureLine('thdPercent', { value: 0.000312 })).toBe('0.00031\u00a0%');
    expect(formatFigureLine('thdPercent', { value: 1.74 })).toBe('1.7\u00a0%');
  });

  it('says at most or at least for a bound, without ±', () => {
    const bound = { value: null, limit: limit({ below: -114.3 }), uncertainty: { expanded: 0.5 } };
    expect(formatFigure('noiseAWeightedDbfs', bound)).toMatchObject({ bound: 'at-most', plusMinus: null });
    expect(formatFigureLine('snrDb', { value: null, limit: limit({ below: 104 }) })).toBe(
      'at least 104.0\u00a0dB',
    );
  });

  it('prints a dash for what was not measured and says so aloud', () => {
    expect(formatFigure('snrDb', { value: null })).toMatchObject({ integer: '–', spoken: 'not measured' });
  });
});

describe('worthOfFigure', () => {
  // Limits of the record's contract: at under 3 dB; near under 10 dB for noise, under 20 dB for products.
  it.each([
    ['noiseDbfs', 2.9, 'at'],
    ['noiseDbfs', 9.9, 'near'],
    ['noiseDbfs', 10, 'clear'],
    ['thdDb', 19.9, 'near'],
    ['thdDb', 20, 'clear'],
  ])('%s with %d dB of margin is %s', (key, marginDb, worth) => {
    expect(worthOfFigure(key, -100, limit({ marginDb }))?.worth).toBe(worth);
  });

  it('tells a missing floor from a missing figure, and marks no frequency', () => {
    expect(worthOfFigure('noiseDbfs', -100, undefined)?.worth).toBe('floor-unknown');
    expect(worthOfFigure('noiseDbfs', null, undefined)?.worth).toBe('not-measured');
    expect(worthOfFigure('noiseDbfs', null, limit({ below: -110 }))?.worth).toBe('at');
    expect(worthOfFigure('fundamentalFrequencyHz', 997, undefined)).toBeNull();
  });
});
