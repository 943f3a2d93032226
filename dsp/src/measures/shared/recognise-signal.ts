import { DspInputError } from '../../errors.js';
import { meanSquareToDbfs } from '../../level/decibel.js';
import type { MeasureId } from '../../record/record.js';
import { channelName } from '../../source/channel-name.js';
import type { CaptureFacts, SampleSource } from '../../source/sample-source.js';
import { removeLobes } from '../../spectrum/remove-lobes.js';
import type { AnalysisContext } from '../measure.js';
import { findSpurs } from './find-spurs.js';
import { lookForTones } from './look-for-tone.js';
import { settleSegment } from './open-analysis.js';
import { planFrames } from './plan-frames.js';
import { scanSegment, type ChannelScan } from './scan-segment.js';
import { shortLevel, shortNumber } from './settings-band.js';
import type { FrameRange } from './stream-frames.js';

/** Seconds that show what a steady signal is. */
const LOOK_S = 10;
/** Below this nobody plays anything, but for a quiet tone. */
const SILENCE_DBFS = -70;
/** A tone between these was played at -60 dBFS, through whatever gain. */
const QUIET_TONE_DBFS = -45;
const FAINT_TONE_DBFS = -80;
/** A single tone's companions, harmonics apart, stand at least this far below it, as power. */
const COMPANION = 0.01;
/** All that isn't the tone or a harmonic of it, against the tone, as power. */
const REST = 0.25;
const STEADY_DB = 3;
const HARMONICS = 60;
const MAINS_HZ = [50, 60, 100, 120, 150, 180];

export interface SignalRecognition {
  readonly measure: MeasureId;
  readonly why: string;
}

/**
 * Tells a tone, a quiet tone and silence apart by the signal alone.
 *
 * @throws DspInputError `NOT_RECOGNISED` for anything else, such as music, noise or several tones
 */
export async function recogniseSignal(
  source: SampleSource,
  options: Pick<AnalysisContext, 'onProgress' | 'signal'>,
): Promise<SignalRecognition> {
  const context: AnalysisContext = { capture: unknownCapture(source), signal: options.signal };
  const tell = (share: number): void => options.onProgress?.(share);
  const steady = await settleSegment(source, {}, null, false, context, (share) => tell(share * 0.8));
  const range = middleOf(steady, LOOK_S * source.sampleRateHz);
  const plan = planFrames(range.to - range.from);
  const sights = await lookForTones(source, range, plan, null);
  const names = sights.map((_, index) => channelName(index));
  const searches = sights.map((sight) => sight?.search ?? null);
  const scans = await scanSegment(
    source,
    names,
    range,
    { plan, windowName: 'blackman-harris-7', searches },
    context,
    (share) => {
      tell(0.8 + 0.2 * share);
    },
  );
  const loudest = scans.reduce((one, other) => (acPower(other) > acPower(one) ? other : one));
  return recogniseChannel(loudest);
}

function recogniseChannel(scan: ChannelScan): SignalRecognition {
  const power = acPower(scan);
  if (power === 0) return { measure: 'idle', why: 'every sample is zero' };
  const levelDbfs = meanSquareToDbfs(power);
  const tone = scan.tone === null ? null : lookAtTone(scan, scan.tone.frequencyHz);
  const isHum = tone !== null && MAINS_HZ.some((mains) => Math.abs(tone.frequencyHz / mains - 1) < 0.01);
  if (tone === null || (isHum && tone.levelDbfs < QUIET_TONE_DBFS) || tone.levelDbfs < FAINT_TONE_DBFS) {
    if (levelDbfs < SILENCE_DBFS || (isHum && levelDbfs < QUIET_TONE_DBFS)) {
      return { measure: 'idle', why: `nothing is played: all of it lies at ${shortLevel(levelDbfs)} dBFS` };
    }
    throw notRecognised(`a signal at ${shortLevel(levelDbfs)} dBFS without a tone that stands out`);
  }
  const about = `a steady tone of ${shortNumber(tone.frequencyHz)} Hz at ${shortLevel(tone.levelDbfs)} dBFS`;
  if (!tone.isSingle)
    throw notRecognised(`a line of ${shortNumber(tone.frequencyHz)} Hz with others beside it`);
  if ((scan.tone?.levelSpreadDb ?? 0) > STEADY_DB) throw notRecognised('a tone that changes its level');
  return tone.levelDbfs < QUIET_TONE_DBFS
    ? { measure: 'dynamic-range', why: `it holds ${about}, so quiet that it shows the noise below it` }
    : { measure: 'tone', why: `it holds ${about}` };
}

function lookAtTone(
  scan: ChannelScan,
  frequencyHz: number,
): { frequencyHz: number; levelDbfs: number; isSingle: boolean } {
  const { spectrum } = scan;
  const end = spectrum.sampleRateHz / 2;
  const orders = Array.from({ length: HARMONICS }, (_, index) => (index + 1) * frequencyHz).filter(
    (place) => place < end,
  );
  const { lobes, power } = removeLobes(spectrum, orders);
  const fundamental = Math.max(0, lobes[0].power);
  const rest = power.reduce((sum, value) => sum + value, 0);
  const reach = 2 * spectrum.exclusionHalfWidthBins * spectrum.binWidthHz;
  const companions = findSpurs(spectrum, { lowHz: 0, highHz: end }).filter((spur) => {
    const order = Math.max(1, Math.round(spur.frequencyHz / frequencyHz));
    return Math.abs(spur.frequencyHz - order * frequencyHz) > reach;
  });
  const { lobes: others } = removeLobes(
    spectrum,
    companions.map((spur) => spur.frequencyHz),
  );
  const levelDbfs = meanSquareToDbfs(fundamental);
  // Hum beside a quiet tone is usual; a second tone of its strength is not.
  const allowed = levelDbfs < QUIET_TONE_DBFS ? 1 : COMPANION;
  const isSingle =
    rest <= REST * fundamental * (levelDbfs < QUIET_TONE_DBFS ? 4 : 1) &&
    others.every((line) => line.power <= allowed * fundamental);
  return { frequencyHz, levelDbfs, isSingle };
}

function acPower(scan: ChannelScan): number {
  return Math.max(0, scan.level.meanSquare - scan.level.mean ** 2);
}

function middleOf(range: FrameRange, atMost: number): FrameRange {
  const length = Math.min(range.to - range.from, Math.round(atMost));
  const from = range.from + ((range.to - range.from - length) >> 1);
  return { from, to: from + length };
}

function notRecognised(found: string): DspInputError {
  return new DspInputError('NOT_RECOGNISED', `the recording can't be told by its signal: it holds ${found}`, {
    found,
    remedy: 'Name the measure, or give the stimulus’s descriptor.',
  });
}

/** The facts that a scan asks for; nothing of them enters what is recognised. */
function unknownCapture(source: SampleSource): CaptureFacts {
  const { sampleRateHz, channelCount, frameCount } = source;
  return {
    sha256: '',
    sampleRateHz,
    channelCount,
    bitsPerSample: 64,
    sampleFormat: 'float',
    frameCount,
    durationS: frameCount / sampleRateHz,
  };
}
