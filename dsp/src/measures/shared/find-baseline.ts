import type { BenchRecord, Calibration, Figures, MeasureId, RecordBody } from '../../record/record.js';
import { shortNumber } from './settings-band.js';

/** What a record must share with the rig's own for its figures to be floors. */
export interface BaselineConditions {
  readonly measure: MeasureId;
  readonly sampleRateHz: number;
  readonly bandLowHz: number;
  readonly bandHighHz: number;
  readonly calibration: Calibration | null;
  /** The tone in the first channel that has one; null without a tone. */
  readonly levelDbfs: number | null;
  readonly frequencyHz: number | null;
}

export type BaselineMatch =
  | { readonly isApplicable: true; readonly channels: ReadonlyMap<string, Figures> }
  | { readonly isApplicable: false; readonly reason: string };

/** Tones this near in level bring the same distortion out of a rig (common practice, no source). */
const SAME_LEVEL_DB = 1;
const SAME_FREQUENCY_SHARE = 0.01;
/** Input ranges differ by steps of dB; a recalibration moves far less. */
const SAME_RANGE_SHARE = 0.02;

/**
 * Looks up the rig's figures that belong to an analysis.
 *
 * @param baseline - the rig's record, of this measure or a programme with a segment of it
 * @returns its figures by channel, or why it doesn't apply
 */
export function matchBaseline(baseline: BenchRecord, conditions: BaselineConditions): BaselineMatch {
  const reasons = [baseline, ...baseline.segments]
    .filter(({ measure }) => measure === conditions.measure)
    .map((body) => ({ body, reason: mismatch(baseline, body, conditions) }));
  const fitting = reasons.find(({ reason }) => reason === null);
  if (fitting === undefined) {
    const reason = reasons.at(0)?.reason ?? `it holds no measure "${conditions.measure}"`;
    return { isApplicable: false, reason };
  }
  return {
    isApplicable: true,
    channels: new Map(fitting.body.channels.map(({ channel, figures }) => [channel, figures])),
  };
}

function mismatch(baseline: BenchRecord, body: RecordBody, conditions: BaselineConditions): string | null {
  const rate = baseline.capture.sampleRateHz;
  if (rate !== conditions.sampleRateHz)
    return `it was taken at ${rate} Hz, and this recording at ${conditions.sampleRateHz} Hz`;
  const { bandLowHz, bandHighHz } = body.settings;
  if (bandLowHz !== conditions.bandLowHz || bandHighHz !== conditions.bandHighHz) {
    return `its band is ${bandLowHz} to ${bandHighHz} Hz`;
  }
  const range = baseline.settings.inputRange ?? baseline.settings.calibration?.inputRange;
  const ownRange = conditions.calibration?.inputRange;
  if (range !== undefined && ownRange !== undefined && range !== ownRange)
    return `it was taken in the recorder’s range “${range}”, and this recording in “${ownRange}”`;
  if (isOtherFullScale(body.settings.calibration, conditions.calibration))
    return 'it was taken with the recorder in another range';
  const level = toneFigure(body, ['fundamentalLevelDbfs', 'highToneLevelDbfs']);
  if (
    level !== null &&
    conditions.levelDbfs !== null &&
    Math.abs(level - conditions.levelDbfs) > SAME_LEVEL_DB
  ) {
    return `its tone lay at ${level.toFixed(1)} dBFS, and this one lies at ${conditions.levelDbfs.toFixed(1)} dBFS`;
  }
  const frequency = toneFigure(body, ['fundamentalFrequencyHz', 'highToneFrequencyHz']);
  if (
    frequency !== null &&
    conditions.frequencyHz !== null &&
    Math.abs(frequency / conditions.frequencyHz - 1) > SAME_FREQUENCY_SHARE
  ) {
    return `its tone was one of ${shortNumber(frequency)} Hz`;
  }
  return null;
}

function isOtherFullScale(one: Calibration | null, other: Calibration | null): boolean {
  if (one === null || other === null) return false;
  return one.channels.some(({ channel, fullScaleVrms }) => {
    const same = other.channels.find((entry) => entry.channel === channel);
    return same !== undefined && Math.abs(same.fullScaleVrms / fullScaleVrms - 1) > SAME_RANGE_SHARE;
  });
}

/** The first of some figures that any channel has: what tells the tone of this measure. */
function toneFigure(body: RecordBody, keys: readonly string[]): number | null {
  const values = body.channels.flatMap(({ figures }) => keys.map((key) => figures[key]));
  return values.find((value) => typeof value === 'number') ?? null;
}
