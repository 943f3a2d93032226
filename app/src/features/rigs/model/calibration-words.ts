import type { Rig, RigCalibration } from '@/lib/api-schema';
import { formatDate, formatDay } from '@/lib/format/date';
import { formatCounted } from '@/lib/format/quantity';

const DAY_MS = 86_400_000;
/** From so many days before its end on, a calibration's end is announced. */
const SOON_DAYS = 30;

export const DIRECTION_WORDS: Record<RigCalibration['direction'], string> = {
  input: 'input',
  output: 'output',
};

export const CHANNEL_WORDS: Record<RigCalibration['channel'], string> = {
  all: 'both channels',
  left: 'left',
  right: 'right',
};

/** "valid until 4 May 2027", "expired on 4 May 2026", "retired on 12 Nov 2026". */
export function stateWords(calibration: RigCalibration): string {
  const { state, validUntil, retiredAt } = calibration;
  if (state === 'retired') return retiredAt ? `retired on ${formatDate(retiredAt)}` : 'retired';
  const words =
    state === 'valid' ? `valid until ${formatDay(validUntil)}` : `expired on ${formatDay(validUntil)}`;
  return calibration.isFollowed ? `${words}, followed by a newer one` : words;
}

/** "runs out in 12 days" when that is soon, else nothing. */
export function endingWords(calibration: RigCalibration, now: Date): string | null {
  if (calibration.state !== 'valid' || calibration.isFollowed) return null;
  const days =
    Math.ceil((new Date(`${calibration.validUntil}T23:59:59`).getTime() - now.getTime()) / DAY_MS) - 1;
  if (days > SOON_DAYS) return null;
  return days <= 0 ? 'runs out today' : `runs out in ${formatCounted(days, 'day')}`;
}

/** True for what people would go on using by mistake: expired, and nothing newer in its place. */
export function isStale({ state, isFollowed }: RigCalibration): boolean {
  return state === 'expired' && !isFollowed;
}

/** Of a rig in a list. */
export function rigCalibrationWords({ calibrationState, calibratedUntil }: Rig): string {
  if (calibratedUntil === null || calibrationState === 'none') return 'not calibrated';
  const day = formatDay(calibratedUntil);
  return calibrationState === 'valid' ? `valid until ${day}` : `expired on ${day}`;
}
