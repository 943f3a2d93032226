import { BITS, DB, entry, type FigureEntry, FIGURE_ENTRIES, HZ, none, PERCENT } from './figure-entries';
import type { DigitRule } from './format/digits';

export type { FigureEntry, FigureKind, FigureSetting } from './figure-entries';

const CATALOGUE: ReadonlyMap<string, FigureEntry> = new Map(FIGURE_ENTRIES.map((item) => [item.key, item]));

/** Keys in the order in which tables show them. */
export const FIGURE_KEYS: readonly string[] = FIGURE_ENTRIES.map(({ key }) => key);

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
