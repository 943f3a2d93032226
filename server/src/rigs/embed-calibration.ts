import { roundToRecordDigits, type Calibration } from '@benchlark/dsp';
import type { RigCalibration } from './rig-calibration.entity';

export type CalibrationFacts = Pick<
  RigCalibration,
  | 'channel'
  | 'direction'
  | 'range'
  | 'sampleRateHz'
  | 'voltsRmsAtFullScale'
  | 'dividerRatio'
  | 'meterUncertaintyPercent'
  | 'takenOn'
>;

/** A calibration as it is embedded: with the rate and range it holds for. */
export type EmbeddedCalibration = Calibration & Required<Pick<Calibration, 'sampleRateHz' | 'inputRange'>>;

/**
 * Volts RMS at the unit for a sine of 0 dBFS.
 *
 * A divider before an input makes the unit's voltage as many times the interface's; one behind an output leaves the unit
 * that part of it (Ohm's law).
 */
export function fullScaleVrms({
  direction,
  voltsRmsAtFullScale,
  dividerRatio,
}: Pick<CalibrationFacts, 'direction' | 'voltsRmsAtFullScale' | 'dividerRatio'>): number {
  const volts =
    direction === 'input' ? voltsRmsAtFullScale * dividerRatio : voltsRmsAtFullScale / dividerRatio;
  return roundToRecordDigits(volts);
}

/**
 * Turns stored calibrations into the one object that settings embed.
 *
 * @param calibrations - at least one; of the same direction, range and rate, each channel at most once
 * @returns of `all`, an entry for left and one for right; the date is the oldest one's
 */
export function embedCalibration(
  calibrations: readonly [CalibrationFacts, ...CalibrationFacts[]],
): EmbeddedCalibration {
  const [{ sampleRateHz, range }] = calibrations;
  const channels = (['left', 'right'] as const).flatMap((channel) => {
    const own = calibrations.find((entry) => entry.channel === channel || entry.channel === 'all');
    return own
      ? [{ channel, fullScaleVrms: fullScaleVrms(own), expandedPercent: own.meterUncertaintyPercent }]
      : [];
  });
  const date = calibrations.map(({ takenOn }) => takenOn).reduce((a, b) => (b < a ? b : a));
  return { schema: 'benchlark-calibration/1', date, sampleRateHz, inputRange: range, channels };
}

/** True when both say the same of the same interface setting, but for channel and date. */
export function isSameSetting(
  one: Pick<RigCalibration, 'direction' | 'range' | 'sampleRateHz'>,
  other: Pick<RigCalibration, 'direction' | 'range' | 'sampleRateHz'>,
): boolean {
  return (
    one.direction === other.direction && one.range === other.range && one.sampleRateHz === other.sampleRateHz
  );
}

type Dated = Pick<
  RigCalibration,
  'channel' | 'direction' | 'range' | 'sampleRateHz' | 'takenOn' | 'createdAt'
>;

/** True when the second was made after the first for the same channel and setting. */
export function isFollowedBy(one: Dated, other: Dated): boolean {
  return (
    one.channel === other.channel &&
    isSameSetting(one, other) &&
    (other.takenOn > one.takenOn ||
      (other.takenOn === one.takenOn && other.createdAt.getTime() > one.createdAt.getTime()))
  );
}
