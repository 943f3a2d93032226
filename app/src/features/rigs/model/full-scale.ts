import type { RigCalibration } from '@/lib/api-schema';
import { formatPlain, withUnit } from '@/lib/format/quantity';
import { readDecimal } from './decimal-field';
import type { CalibrationFields, CalibrationValues } from './rig-forms';
import type { components } from '@/lib/api-types';

/** A meter's reading is worth no more digits. */
const DIGITS = 4;

/** Volts RMS at the interface's terminals for 0 dBFS, from a reading at another level; a level is 20 lg of the ratio. */
export function voltsAtFullScale(meterVrms: number, levelDbfs: number): number {
  return Number((meterVrms * 10 ** (-levelDbfs / 20)).toPrecision(9));
}

/** What the server takes: the reading brought to full scale. */
export function toNewCalibration({
  meterVrms,
  levelDbfs,
  ...facts
}: CalibrationValues): components['schemas']['CreateCalibrationDto'] {
  return { ...facts, voltsRmsAtFullScale: voltsAtFullScale(meterVrms, levelDbfs) };
}

export function formatVolts(volts: number): string {
  return withUnit(formatPlain(Number(volts.toPrecision(DIGITS))), 'V');
}

type Reading = Pick<CalibrationFields, 'direction' | 'meterVrms' | 'levelDbfs' | 'dividerRatio'>;

/** "3.52 V RMS at the meter with a divider of 10 is 35.2 V at full scale." Null until the numbers are there. */
export function fullScaleSentence({ direction, ...fields }: Reading): string | null {
  const meterVrms = readDecimal(fields.meterVrms);
  const levelDbfs = readDecimal(fields.levelDbfs);
  const ratio = readDecimal(fields.dividerRatio);
  if (
    meterVrms === null ||
    meterVrms <= 0 ||
    levelDbfs === null ||
    levelDbfs > 0 ||
    ratio === null ||
    ratio < 1
  ) {
    return null;
  }
  const isInput = direction === 'input';
  const volts = voltsAtFullScale(meterVrms, levelDbfs);
  const level = withUnit(formatPlain(levelDbfs), 'dBFS');
  const circumstance =
    levelDbfs === 0 ? '' : isInput ? ` while the recording shows ${level}` : ` while ${level} is played`;
  const reading = `${formatVolts(meterVrms)} RMS at the meter${circumstance}`;
  if (ratio === 1) return `${reading} is ${formatVolts(volts)} at full scale.`;
  const divider = `a divider of ${formatPlain(ratio)}`;
  return isInput
    ? `${reading} with ${divider} is ${formatVolts(volts * ratio)} at full scale.`
    : `${reading} is ${formatVolts(volts)} at full scale; behind ${divider} the unit is given ${formatVolts(volts / ratio)}.`;
}

/** "3.52 V with a divider of 10", under the full scale it gives; nothing without a divider. */
export function dividerWords({ voltsRmsAtFullScale, dividerRatio }: RigCalibration): string {
  return dividerRatio === 1
    ? ''
    : `${formatVolts(voltsRmsAtFullScale)}, divider of ${formatPlain(dividerRatio)}`;
}
