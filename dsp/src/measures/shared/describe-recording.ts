import { makeWarning } from '../../record/make-warning.js';
import type { Warning } from '../../record/record.js';
import type { CaptureFacts } from '../../source/sample-source.js';
import type { LevelReading } from '../../level/create-level-meter.js';
import type { ToneTrack } from './tone-tracker.js';
import type { ChannelScan } from './scan-segment.js';
import { shortLevel, shortNumber } from './settings-band.js';

const NEAR_FULL_SCALE = 0.995;
/** Share of full scale from which an offset is worth a word. */
const OFFSET = 1e-3;
/** A clipped top is longer than a full-scale tone's own rounded one by more than this share and these samples. */
const LONGER_SHARE = 1.5;
const LONGER_SAMPLES = 2;

/**
 * Whether the recorder ran out of range.
 *
 * A low tone at exactly full scale rests on the end code for several samples by rounding alone: its top is within one
 * step of the end for 2 arccos(1 - step) of its period.
 */
export function isOverloaded(
  scan: { readonly level: LevelReading; readonly tone: Pick<ToneTrack, 'frequencyHz'> | null },
  capture: CaptureFacts,
): boolean {
  const { clippedRunCount, longestEndCodeRun } = scan.level;
  if (clippedRunCount === 0) return false;
  if (scan.tone === null) return true;
  const step = capture.sampleFormat === 'integer' ? 2 ** (1 - capture.bitsPerSample) : 0;
  const radiansPerSample = (2 * Math.PI * scan.tone.frequencyHz) / capture.sampleRateHz;
  const restingSamples = (2 * Math.acos(1 - 1.5 * step)) / radiansPerSample;
  return longestEndCodeRun > LONGER_SHARE * restingSamples + LONGER_SAMPLES;
}

/** Warnings about a channel's recording as such, whatever is measured on it. */
export function describeRecording(scan: ChannelScan, capture: CaptureFacts): Warning[] {
  const { channel, level } = scan;
  const warnings: Warning[] = [];
  if (isOverloaded(scan, capture)) {
    warnings.push(makeWarning('recording-overloaded', { runs: level.clippedRunCount }, { channel }));
  } else if (level.samplePeak >= NEAR_FULL_SCALE) {
    const peak = (20 * Math.log10(level.samplePeak)).toFixed(2);
    warnings.push(makeWarning('near-full-scale', { peak }, { channel, figures: ['samplePeakDbfs'] }));
  }
  if (Math.abs(scan.constant) >= OFFSET) {
    const values = {
      offset: shortNumber(Number((scan.constant * 100).toPrecision(2))),
      level: shortLevel(20 * Math.log10(Math.abs(scan.constant))),
    };
    warnings.push(makeWarning('dc-offset', values, { channel, figures: ['dcOffsetDbfs'] }));
  }
  return warnings;
}
