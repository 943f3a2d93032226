import type { RecordSettings } from '@benchlark/dsp';
import type { DigitRule } from './format/digits';
import { formatNumber } from './format/number';
import { formatFrequency, withUnit } from './format/quantity';

/** What decides how far a figure must stand above the rig before the rig has no part in it. */
export type FigureKind = 'signal' | 'noise' | 'product' | 'plain';

/** What a figure's conditions are written from. */
export interface FigureSetting {
  readonly settings: Pick<RecordSettings, 'bandLowHz' | 'bandHighHz' | 'highestHarmonic'>;
  readonly fundamentalFrequencyHz?: number | null;
}

export interface FigureEntry {
  readonly key: string;
  readonly label: string;
  /** Empty for a bare number. */
  readonly unit: string;
  readonly kind: FigureKind;
  readonly digits: DigitRule;
  /** The record's value times this is what is shown, where its own unit would be all zeros (0.000 001 2 s). */
  readonly scale?: number;
  /** A bounded figure says "at most", or "at least" where more is better. */
  readonly bound: 'at-most' | 'at-least';
  readonly conditions: (setting: FigureSetting) => string | null;
}

type Conditions = FigureEntry['conditions'];

const band: Conditions = ({ settings }) =>
  `${formatFrequency(settings.bandLowHz)} to ${formatFrequency(settings.bandHighHz)}`;
const harmonics: Conditions = ({ settings }) => `harmonics 2 to ${settings.highestHarmonic}`;
const words =
  (text: string): Conditions =>
  () =>
    text;
export const none: Conditions = () => null;

export const DB: DigitRule = { decimals: 1, mostDecimals: 2 };
/** Common practice: a percentage is given to two digits; a third where its uncertainty allows. */
export const PERCENT: DigitRule = { significant: 2, mostSignificant: 3 };
export const HZ: DigitRule = { decimals: 1, mostDecimals: 4 };
export const BITS: DigitRule = { decimals: 1, mostDecimals: 2 };

export function entry(
  key: string,
  label: string,
  unit: string,
  kind: FigureKind,
  digits: DigitRule,
  conditions: Conditions,
  bound: FigureEntry['bound'] = 'at-most',
): FigureEntry {
  return { key, label, unit, kind, digits, conditions, bound };
}

const FINE_DB: DigitRule = { decimals: 2, mostDecimals: 3 };
const LEVEL_STEP: DigitRule = { decimals: 1, mostDecimals: 1 };
const WHOLE_HZ: DigitRule = { significant: 4, mostSignificant: 5 };

/** Every figure of the record's table of measures, in the order in which tables show them. */
export const FIGURE_ENTRIES: readonly FigureEntry[] = [
  entry('fundamentalFrequencyHz', 'Frequency', 'Hz', 'plain', HZ, words('fundamental')),
  entry('fundamentalLevelDbfs', 'Level', 'dBFS', 'signal', DB, ({ fundamentalFrequencyHz }) =>
    typeof fundamentalFrequencyHz === 'number'
      ? `fundamental, ${withUnit(formatNumber(fundamentalFrequencyHz, { decimals: 1 }), 'Hz')}`
      : 'fundamental',
  ),
  entry('thdDb', 'THD', 'dB', 'product', DB, harmonics),
  entry('thdPercent', 'THD', '%', 'product', PERCENT, harmonics),
  entry('thdPlusNoiseDb', 'THD+N', 'dB', 'noise', DB, band),
  entry('thdPlusNoisePercent', 'THD+N', '%', 'noise', PERCENT, band),
  entry('sinadDb', 'SINAD', 'dB', 'noise', DB, band, 'at-least'),
  entry('snrDb', 'SNR', 'dB', 'noise', DB, (setting) => `${harmonics(setting)} left out`, 'at-least'),
  entry('enobBits', 'Effective bits', 'bits', 'noise', BITS, words('from SINAD'), 'at-least'),
  entry('noiseDbfs', 'Noise', 'dBFS', 'noise', DB, band),
  entry('noiseAWeightedDbfs', 'Noise, A-weighted', 'dBFS', 'noise', DB, band),
  entry(
    'noiseItu468RmsDbfs',
    'Noise, CCIR-RMS',
    'dBFS',
    'noise',
    DB,
    words('ITU-R BS.468 less 5.63 dB, RMS'),
  ),
  entry('samplePeakDbfs', 'Sample peak', 'dBFS', 'signal', DB, none),
  entry('truePeakDbtp', 'True peak', 'dBTP', 'signal', DB, none),
  entry('crestFactorDb', 'Crest factor', 'dB', 'plain', DB, words('peak over RMS')),
  entry('dcOffsetDbfs', 'DC offset', 'dBFS', 'signal', DB, none),
  entry('mainsFrequencyHz', 'Mains frequency', 'Hz', 'plain', { decimals: 2, mostDecimals: 3 }, none),
  entry('humDbfs', 'Hum', 'dBFS', 'noise', DB, words('the mains and its multiples')),
  entry('dynamicRangeDb', 'Dynamic range', 'dB', 'noise', DB, band, 'at-least'),
  entry('dynamicRangeAWeightedDb', 'Dynamic range, A-weighted', 'dB', 'noise', DB, band, 'at-least'),
  entry(
    'dynamicRangeItu468RmsDb',
    'Dynamic range, CCIR-RMS',
    'dB',
    'noise',
    DB,
    words('ITU-R BS.468 less 5.63 dB, RMS'),
    'at-least',
  ),
  entry('lowToneFrequencyHz', 'Low tone', 'Hz', 'plain', HZ, none),
  entry('highToneFrequencyHz', 'High tone', 'Hz', 'plain', HZ, none),
  entry('lowToneLevelDbfs', 'Level of the low tone', 'dBFS', 'signal', DB, none),
  entry('highToneLevelDbfs', 'Level of the high tone', 'dBFS', 'signal', DB, none),
  entry(
    'modulationDistortionDb',
    'Modulation distortion',
    'dB',
    'product',
    DB,
    words('2nd and 3rd order, against the high tone'),
  ),
  entry(
    'modulationDistortionPercent',
    'Modulation distortion',
    '%',
    'product',
    PERCENT,
    words('2nd and 3rd order, against the high tone'),
  ),
  entry('differenceD2Db', 'Difference tone, 2nd order', 'dB', 'product', DB, words('against both tones')),
  entry('differenceD3Db', 'Difference tones, 3rd order', 'dB', 'product', DB, words('against both tones')),
  entry('differenceDistortionDb', 'Difference distortion', 'dB', 'product', DB, words('both orders')),
  entry(
    'linearDownToDbfs',
    'Linear down to',
    'dBFS played',
    'plain',
    LEVEL_STEP,
    words('within 0.5 dB of the \u221220 dBFS step'),
  ),
  entry(
    'maxDeviationDb',
    'Largest deviation',
    'dB',
    'plain',
    FINE_DB,
    words('from the top step to \u221260 dBFS'),
  ),
  entry('fullScaleGainErrorDb', 'Gain error at full scale', 'dB', 'plain', FINE_DB, words('the top step')),
  entry('flatnessDb', 'Flatness, \u00b1', 'dB', 'plain', FINE_DB, band),
  entry('minus3DbLowHz', '\u22123 dB at the low end', 'Hz', 'plain', WHOLE_HZ, words('against 1 kHz')),
  entry('minus3DbHighHz', '\u22123 dB at the high end', 'Hz', 'plain', WHOLE_HZ, none),
  entry('levelAt20HzDb', 'Level at 20 Hz', 'dB', 'plain', FINE_DB, words('against 1 kHz')),
  entry('levelAt20kHzDb', 'Level at 20 kHz', 'dB', 'plain', FINE_DB, words('against 1 kHz')),
  entry('noiseAndDistortionDb', 'Noise and distortion', 'dB', 'noise', DB, words('between the tones')),
  entry(
    'separationLeftToRightAt1kHzDb',
    'Separation, left into right',
    'dB',
    'product',
    DB,
    words('at 1 kHz'),
    'at-least',
  ),
  entry(
    'separationRightToLeftAt1kHzDb',
    'Separation, right into left',
    'dB',
    'product',
    DB,
    words('at 1 kHz'),
    'at-least',
  ),
  entry(
    'separationLeftToRightAt10kHzDb',
    'Separation, left into right',
    'dB',
    'product',
    DB,
    words('at 10 kHz'),
    'at-least',
  ),
  entry(
    'separationRightToLeftAt10kHzDb',
    'Separation, right into left',
    'dB',
    'product',
    DB,
    words('at 10 kHz'),
    'at-least',
  ),
  entry('balanceDb', 'Balance', 'dB', 'plain', FINE_DB, words('right less left, at 1 kHz')),
  {
    ...entry(
      'interchannelDelayS',
      'Delay between channels',
      '\u00b5s',
      'plain',
      { decimals: 2 },
      words('plus: right is late'),
    ),
    scale: 1e6,
  },
  entry('interchannelPolarity', 'Polarity between channels', '', 'plain', { decimals: 0 }, none),
  entry(
    'jitterPeakToPeakPs',
    'Jitter, peak to peak',
    'ps',
    'product',
    { significant: 3 },
    words('sidebands within 5 kHz'),
  ),
  entry('jitterRmsPs', 'Jitter, RMS', 'ps', 'product', { significant: 3 }, words('sidebands within 5 kHz')),
  entry(
    'levelErrorDb',
    'Level error over full scale',
    'dB',
    'plain',
    FINE_DB,
    words('against the tone 6 dB lower'),
  ),
  entry('passBandRippleDb', 'Pass-band ripple', 'dB', 'plain', FINE_DB, words('greatest to least')),
  entry('imageRejectionDb', 'Image rejection', 'dB', 'product', DB, none, 'at-least'),
  entry('integratedLufs', 'Integrated loudness', 'LUFS', 'plain', DB, words('ITU-R BS.1770')),
  entry('loudnessRangeLu', 'Loudness range', 'LU', 'plain', DB, words('EBU Tech 3342')),
  entry('peakToLoudnessRatioDb', 'Peak to loudness', 'dB', 'plain', DB, words('true peak over integrated')),
  entry('clippedRunCount', 'Clipped runs', '', 'plain', { decimals: 0 }, words('3 or more equal end codes')),
  entry(
    'clockOffsetPpm',
    'Clock offset',
    'ppm',
    'plain',
    { decimals: 1, mostDecimals: 2 },
    words('plus: the player is fast'),
  ),
];
