import { formatNumber, MINUS, NO_BREAK_SPACE, THIN_SPACE } from './number';

/** A number and its unit for running text, never broken between them. */
export function withUnit(number: string, unit: string): string {
  return unit === '' ? number : `${number}${NO_BREAK_SPACE}${unit}`;
}

/** 997 Hz, 1 994 Hz, 20 kHz from 10 kHz on when that loses nothing. */
export function formatFrequency(frequencyHz: number, decimals?: number): string {
  if (decimals === undefined && frequencyHz >= 10_000 && frequencyHz % 100 === 0) {
    return withUnit(formatPlain(frequencyHz / 1000), 'kHz');
  }
  return withUnit(
    decimals === undefined ? formatPlain(frequencyHz) : formatNumber(frequencyHz, { decimals }),
    'Hz',
  );
}

/** 44.1 kHz, 96 kHz, 176.4 kHz. */
export function formatSampleRate(sampleRateHz: number): string {
  return withUnit(formatPlain(sampleRateHz / 1000), 'kHz');
}

export function formatLevel(levelDb: number, unit = 'dBFS', decimals = 1): string {
  return withUnit(formatNumber(levelDb, { decimals }), unit);
}

export function formatPercent(share: number, decimals = 0): string {
  return withUnit(formatNumber(share * 100, { decimals }), '%');
}

export function formatCount(count: number): string {
  return formatNumber(count, { decimals: 0 });
}

/** "1 capture", "2 058 captures". */
export function formatCounted(count: number, one: string, many = `${one}s`): string {
  return `${formatCount(count)} ${count === 1 ? one : many}`;
}

/** Points of a transform: 64k for 65 536, as the trade says it. */
export function formatPoints(points: number): string {
  return points >= 1024 && points % 1024 === 0 ? `${points / 1024}k` : formatCount(points);
}

const BYTE_UNITS = ['B', 'kB', 'MB', 'GB', 'TB'] as const;

/** Powers of 1000 (IEC 80000-13), three digits at most after rounding: 512 B, 17.3 MB, 138.2 MB. */
export function formatBytes(sizeBytes: number): string {
  let value = sizeBytes;
  let step = 0;
  while (value >= 999.5 && step < BYTE_UNITS.length - 1) {
    value /= 1000;
    step += 1;
  }
  return withUnit(formatNumber(value, { decimals: step === 0 ? 0 : 1 }), BYTE_UNITS[step] ?? 'B');
}

/** 0.25 s, 5.0 s, 3 min 40 s, 1 h 12 min. */
export function formatDuration(durationS: number): string {
  if (durationS < 1) return withUnit(formatNumber(durationS, { decimals: 2 }), 's');
  if (durationS < 59.95) return withUnit(formatNumber(durationS, { decimals: 1 }), 's');
  const wholeS = Math.round(durationS);
  const hours = Math.floor(wholeS / 3600);
  const minutes = Math.floor((wholeS % 3600) / 60);
  const seconds = wholeS % 60;
  const parts =
    hours > 0
      ? [
          [hours, 'h'],
          [minutes, 'min'],
        ]
      : [
          [minutes, 'min'],
          [seconds, 's'],
        ];
  return parts
    .filter(([amount], index) => index === 0 || amount !== 0)
    .map(([amount, unit]) => withUnit(formatCount(Number(amount)), String(unit)))
    .join(' ');
}

/** As many digits as the number has, with our minus and thin spaces; for settings, never for measured values. */
export function formatPlain(value: number): string {
  const [integer = '0', fraction] = String(Math.abs(Number(value.toPrecision(12)))).split('.');
  const grouped = integer.replace(/\B(?=(\d{3})+$)/g, THIN_SPACE);
  return (value < 0 ? MINUS : '') + grouped + (fraction === undefined ? '' : `.${fraction}`);
}

/** The first eight and last four digits of a hash, as it is read aloud: 7c41 e0b9 … 52da. */
export function formatHash(sha256: string): string {
  return `${sha256.slice(0, 4)} ${sha256.slice(4, 8)} \u2026 ${sha256.slice(-4)}`;
}

const ORDINAL_ENDS = new Map([
  ['one', 'st'],
  ['two', 'nd'],
  ['few', 'rd'],
]);
const ordinalRules = new Intl.PluralRules('en-GB', { type: 'ordinal' });

/** 2nd, 3rd, 11th. */
export function formatOrdinal(order: number): string {
  return `${order}${ORDINAL_ENDS.get(ordinalRules.select(order)) ?? 'th'}`;
}
