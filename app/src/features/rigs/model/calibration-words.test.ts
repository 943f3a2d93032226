import { describe, expect, it } from 'vitest';
import { makeCalibration, makeRig } from '@/testing/make-rig';
import { endingWords, isStale, rigCalibrationWords, stateWords } from './calibration-words';

describe('the state of a calibration in words', () => {
  const validUntil = '2026-05-04';
  it.each([
    [{}, 'valid until 4 May 2026', false],
    [{ isFollowed: true }, 'valid until 4 May 2026, followed by a newer one', false],
    [{ state: 'expired' as const }, 'expired on 4 May 2026', true],
    [
      { state: 'expired' as const, isFollowed: true },
      'expired on 4 May 2026, followed by a newer one',
      false,
    ],
    [{ state: 'retired' as const, retiredAt: '2026-04-02T12:00:00.000Z' }, 'retired on 2 Apr 2026', false],
  ])('for %j is "%s"', (change, words, stale) => {
    const calibration = makeCalibration({ validUntil, ...change });
    expect(stateWords(calibration)).toBe(words);
    expect(isStale(calibration)).toBe(stale);
  });

  it.each([
    [new Date(2026, 4, 4, 9), 'runs out today'],
    [new Date(2026, 4, 3, 23, 59), 'runs out in 1 day'],
    [new Date(2026, 3, 4, 9), 'runs out in 30 days'],
    [new Date(2026, 3, 3, 9), null],
  ])('on %s: %s', (now, words) => {
    expect(endingWords(makeCalibration({ validUntil }), now)).toBe(words);
  });

  it('says of a rig what its newest is worth', () => {
    expect(rigCalibrationWords(makeRig())).toBe('not calibrated');
    const until = (calibrationState: 'valid' | 'expired') =>
      rigCalibrationWords(makeRig({ calibrationState, calibratedUntil: validUntil }));
    expect(until('valid')).toBe('valid until 4 May 2026');
    expect(until('expired')).toBe('expired on 4 May 2026');
  });
});
