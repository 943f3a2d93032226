import { figureUnit, type FigureUnit } from '@benchlark/dsp';

const UNIT_WORDS: Readonly<Record<FigureUnit, string>> = {
  Dbfs: 'dBFS',
  Dbtp: 'dBTP',
  Dbr: 'dBr',
  Dbv: 'dBV',
  Db: 'dB',
  Lufs: 'LUFS',
  Lu: 'LU',
  Percent: '%',
  Hz: 'Hz',
  Ppm: 'ppm',
  Ps: 'ps',
  Deg: '°',
  Bits: 'bits',
  Count: '',
  Ratio: '',
  S: 's',
  V: 'V',
};

/** The unit that a key ends in, as people write it; empty for a word, a count or a ratio. */
export function unitWord(key: string): string {
  const unit = figureUnit(key);
  return unit === null ? '' : UNIT_WORDS[unit];
}
