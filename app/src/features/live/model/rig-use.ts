import { parseCalibration, type BenchRecord, type Calibration } from '@benchlark/dsp';
import type { components } from '@/lib/api-types';
import { decimalsForSignificant, formatNumber } from '@/lib/format/number';
import { withUnit } from '@/lib/format/quantity';

type LiveSettings = components['schemas']['LiveSettingsDto'];

/** What is known of the rig that is worked on, at the rate it runs at and in the range that is set. */
export interface RigUse {
  /** Nothing is ever played louder, dBFS. */
  readonly limitDbfs: number;
  readonly range: string | null;
  readonly calibration: { readonly id: string; readonly content: Calibration } | null;
  readonly baseline: { readonly id: string; readonly recordId: string; readonly content: BenchRecord } | null;
  /** V RMS of a sine of 0 dBFS at the output, where it is calibrated. */
  readonly outputVrms: number | null;
  readonly loadOhm: number | null;
}

export const UNKNOWN_RIG: RigUse = {
  limitDbfs: 0,
  range: null,
  calibration: null,
  baseline: null,
  outputVrms: null,
  loadOhm: null,
};

/** Ranges of the input that the rig knows at this rate, each once. */
export function rangesAt(settings: LiveSettings, sampleRateHz: number): string[] {
  const known = [
    ...settings.inputs.map(({ range, sampleRateHz: rate }) => ({ range, rate })),
    ...settings.baselines.map(({ inputRange, sampleRateHz: rate }) => ({ range: inputRange, rate })),
  ];
  return [...new Set(known.filter(({ rate }) => rate === sampleRateHz).map(({ range }) => range))];
}

/**
 * What of a rig's books holds now: nothing of another rate or range is taken.
 *
 * @param range - the input's setting as the person says it stands; null takes the first that is known
 */
export function rigUseOf(settings: LiveSettings, sampleRateHz: number, range: string | null): RigUse {
  const ranges = rangesAt(settings, sampleRateHz);
  const set = range !== null && ranges.includes(range) ? range : (ranges[0] ?? null);
  const input = settings.inputs.find((one) => one.sampleRateHz === sampleRateHz && one.range === set);
  const baseline = settings.baselines.find(
    (one) => one.sampleRateHz === sampleRateHz && one.inputRange === set,
  );
  const output = settings.outputs.find((one) => one.sampleRateHz === sampleRateHz) ?? settings.outputs[0];
  return {
    limitDbfs: Math.min(0, settings.limitDbfs ?? 0),
    range: set,
    calibration: input ? { id: input.id, content: parseCalibration(input.calibration) } : null,
    // The server gives the very object that settings embed; its shape is the contract's.
    baseline: baseline
      ? {
          id: baseline.id,
          recordId: baseline.recordId,
          content: baseline.baseline as unknown as BenchRecord,
        }
      : null,
    outputVrms: output?.calibration.channels[0]?.fullScaleVrms ?? null,
    loadOhm: input?.loadOhm ?? output?.loadOhm ?? null,
  };
}

/** "1.84 V": what a sine of this level is at a calibrated output. */
export function voltsWords(fullScaleVrms: number, levelDbfs: number): string {
  const volts = fullScaleVrms * 10 ** (levelDbfs / 20);
  return withUnit(formatNumber(volts, { decimals: Math.max(0, decimalsForSignificant(volts, 3)) }), 'V');
}
