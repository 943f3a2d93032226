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
const none: Conditions = () => null;

const DB: DigitRule = { decimals: 1, mostDecimals: 2 };
/** Common practice: a percentage is given to two digits; a third where its uncertainty allows. */
const PERCENT: DigitRule = { significant: 2, mostSignificant: 3 };
const HZ: DigitRule = { decimals: 1, mostDecimals: 4 };
const BITS: DigitRule = { decimals: 1, mostDecimals: 2 };

function entry(
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

const ENTRIES: readonly FigureEntry[] = [
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
];

const CATALOGUE: ReadonlyMap<string, FigureEntry> = new Map(ENTRIES.map((item) => [item.key, item]));

/** Keys in the order in which tables show them. */
export const FIGURE_KEYS: readonly string[] = ENTRIES.map(({ key }) => key);

/** Unit by the key's ending (the contract: every key ends in its unit), longest ending first. */
const UNIT_BY_ENDING: readonly (readonly [string, string, DigitRule])[] = [
  ['Percent', '%', PERCENT],
  ['Dbfs', 'dBFS', DB],
  ['Dbtp', 'dBTP', DB],
  ['Lufs', 'LUFS', DB],
  ['Dbr', 'dBr', DB],
  ['Dbv', 'dBV', DB],
  ['Ppm', 'ppm', { decimals: 1 }],
  ['Deg', '°', { decimals: 0 }],
  ['Bits', 'bits', BITS],
  ['Count', '', { decimals: 0 }],
  ['Ratio', '', { significant: 3 }],
  ['Db', 'dB', DB],
  ['Hz', 'Hz', HZ],
  ['Ps', 'ps', { significant: 3 }],
  ['Lu', 'LU', DB],
  ['S', 's', { significant: 3 }],
  ['V', 'V', { significant: 3 }],
];

/** Calibrated twins stand beside a figure against full scale: noiseV and noiseDbv beside noiseDbfs. */
function findCalibratedTwin(key: string): FigureEntry | undefined {
  const stem = /^(.*?)(Dbv|V)$/.exec(key);
  const twin = stem && CATALOGUE.get(`${stem[1]}Dbfs`);
  if (!stem || !twin) return undefined;
  return stem[2] === 'V'
    ? { ...twin, key, unit: 'V', digits: { significant: 3 } }
    : { ...twin, key, unit: 'dBV' };
}

/** A key that no catalogue names yet still reads well: "balanceDb" gives "Balance", dB. */
function describeUnknownKey(key: string): FigureEntry {
  const found = UNIT_BY_ENDING.find(([ending]) => key.endsWith(ending) && key.length > ending.length);
  const [ending, unit, digits] = found ?? ['', '', { significant: 3 }];
  const stem = ending === '' ? key : key.slice(0, -ending.length);
  const spaced = stem.replace(/([a-z0-9])([A-Z])/g, '$1 $2').toLowerCase();
  return entry(key, spaced.charAt(0).toUpperCase() + spaced.slice(1), unit, 'plain', digits, none);
}

/** How a figure of the record is named, rounded and worded. */
export function describeFigure(key: string): FigureEntry {
  return CATALOGUE.get(key) ?? findCalibratedTwin(key) ?? describeUnknownKey(key);
}
