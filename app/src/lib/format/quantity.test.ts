import { describe, expect, it } from 'vitest';
import { dayParts, formatDateTime, formatWait } from './date';
import {
  formatBytes,
  formatCounted,
  formatDuration,
  formatFrequency,
  formatHash,
  formatOrdinal,
  formatPercent,
  formatPoints,
  formatSampleRate,
} from './quantity';

const plain = (text: string) => text.replace(/\u00a0|\u202f/g, ' ');

describe('quantities', () => {
  it.each([
    [formatFrequency(997), '997 Hz'],
    [formatFrequency(1994), '1 994 Hz'],
    [formatFrequency(20000), '20 kHz'],
    [formatFrequency(47999.3), '47 999.3 Hz'],
    [formatSampleRate(44100), '44.1 kHz'],
    [formatBytes(512), '512 B'],
    [formatBytes(17_300_000), '17.3 MB'],
    [formatBytes(999_960), '1.0 MB'],
    [formatBytes(1_073_741_824), '1.1 GB'],
    [formatDuration(0.25), '0.25 s'],
    [formatDuration(5), '5.0 s'],
    [formatDuration(220), '3 min 40 s'],
    [formatDuration(59.97), '1 min'],
    [formatDuration(4320), '1 h 12 min'],
    [formatCounted(1, 'capture'), '1 capture'],
    [formatCounted(2058, 'capture'), '2 058 captures'],
    [formatPercent(0.62), '62 %'],
    [formatPoints(65536), '64k'],
    [formatPoints(1000), '1 000'],
  ])('%s', (text, expected) => {
    expect(plain(text)).toBe(expected);
  });

  it('names a hash by its ends and orders as the trade says them', () => {
    expect(formatHash(`7c41e0b9${'0'.repeat(52)}52da`)).toBe('7c41 e0b9 … 52da');
    expect([2, 3, 4, 11, 21].map(formatOrdinal)).toEqual(['2nd', '3rd', '4th', '11th', '21st']);
  });
});

describe('dates', () => {
  const moment = new Date(2026, 10, 12, 14, 11);
  it('writes 12 Nov 2026, 14:11, and three letters for September', () => {
    expect(formatDateTime(moment)).toBe('12 Nov 2026, 14:11');
    expect(dayParts(new Date(2026, 8, 3))).toEqual({ key: '2026-9-3', day: '3', month: 'Sep', year: '2026' });
  });

  it('counts days by the calendar, not by 24 hours', () => {
    const now = new Date(2026, 10, 13, 0, 5);
    expect(formatWait(new Date(2026, 10, 13, 0, 1), now)).toBe('today');
    expect(formatWait(moment, now)).toBe('yesterday');
    expect(formatWait(new Date(2026, 10, 6), now)).toBe('7 days');
    expect(formatWait(new Date(2026, 9, 1), now)).toBe('6 weeks');
  });
});
