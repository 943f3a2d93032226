export const CALIBRATION_STATES = ['valid', 'expired', 'retired'] as const;
export type CalibrationState = (typeof CALIBRATION_STATES)[number];

/** A day of the calendar in UTC, YYYY-MM-DD: such days compare as texts. */
export function dayOf(moment: Date): string {
  return moment.toISOString().slice(0, 10);
}

/** What a calibration is worth on a day; it holds through its last day. */
export function calibrationState(
  calibration: { readonly validUntil: string; readonly retiredAt: Date | null },
  day: string,
): CalibrationState {
  if (calibration.retiredAt !== null) return 'retired';
  return day <= calibration.validUntil ? 'valid' : 'expired';
}
