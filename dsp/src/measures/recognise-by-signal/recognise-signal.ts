import { meanSquareToDbfs } from '../../level/decibel.js';
import { channelName } from '../../source/channel-name.js';
import type { CaptureFacts, SampleSource } from '../../source/sample-source.js';
import { removeLobes } from '../../spectrum/remove-lobes.js';
import type { AnalysisContext } from '../measure.js';
import type { SignalRecognition } from './signal-recognition.js';
import { recogniseChange } from './recognise-change.js';
import { recogniseSpectrum } from './recognise-spectrum.js';
import { findSpurs } from '../shared/find-spurs.js';
import { lookForTones } from '../shared/look-for-tone.js';
import { settleSegment } from '../shared/open-analysis.js';
import { planFrames } from '../shared/plan-frames.js';
import { scanSegment, type ChannelScan } from '../shared/scan-segment.js';
import { shortLevel, shortNumber } from '../shared/settings-band.js';
import type { FrameRange } from '../shared/stream-frames.js';

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
const USUAL_RATES_HZ = [44_100, 48_000, 88_200, 96_000, 176_400, 192_000];
/** A clock keeps its rate within this. */
const SAME_CLOCK = 3e-4;
/** The jitter test's tone lies at -3 dBFS, through whatever gain. */
const LOUD_QUARTER_DBFS = -25;
const MAINS_HZ = [50, 60, 100, 120, 150, 180];

/**
 * Tells what a recording holds by its signal alone: steps and sweeps by how they change, then what is steady by its
 * spectrum; sound that is none of these counts as music.
 *
 * @throws DspInputError `EMPTY_SIGNAL`, `SEGMENT_TOO_SHORT`, `CANCELLED`
 */
export async function recogniseSignal(
  source: SampleSource,
  options: Pick<AnalysisContext, 'onProgress' | 'signal'>,
): Promise<SignalRecognition> {
  const context: AnalysisContext = { capture: unknownCapture(source), signal: options.signal };
  const tell = (share: number): void => options.onProgress?.(share);
  const changing = await recogniseChange(source, context);
  tell(0.4);
  if (changing !== null) return changing;
  const steady = await settleSegment(source, {}, null, false, context, (share) => tell(0.4 + share * 0.4));
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
  const single = recogniseChannel(loudest);
  if ('measure' in single) return single;
  const many = recogniseSpectrum(loudest);
  if (many !== null) return many;
  return {
    measure: 'loudness',
    why: `it holds ${single.found}: it is taken for music, whose loudness and clipped runs can be told`,
  };
}

/** What is there, in words, where it is neither silence nor one tone. */
interface Unknown {
  readonly found: string;
}

function recogniseChannel(scan: ChannelScan): SignalRecognition | Unknown {
  const power = acPower(scan);
  if (power === 0) return { measure: 'idle', why: 'every sample is zero' };
  const levelDbfs = meanSquareToDbfs(power);
  const tone = scan.tone === null ? null : lookAtTone(scan, scan.tone.frequencyHz);
  const isHum = tone !== null && MAINS_HZ.some((mains) => Math.abs(tone.frequencyHz / mains - 1) < 0.01);
  if (tone === null || (isHum && tone.levelDbfs < QUIET_TONE_DBFS) || tone.levelDbfs < FAINT_TONE_DBFS) {
    if (levelDbfs < SILENCE_DBFS || (isHum && levelDbfs < QUIET_TONE_DBFS)) {
      return { measure: 'idle', why: `nothing is played: all of it lies at ${shortLevel(levelDbfs)} dBFS` };
    }
    return { found: `a signal at ${shortLevel(levelDbfs)} dBFS without a tone that stands out` };
  }
  const about = `a steady tone of ${shortNumber(tone.frequencyHz)} Hz at ${shortLevel(tone.levelDbfs)} dBFS`;
  if (!tone.isSingle) {
    return { found: `a line of ${shortNumber(tone.frequencyHz)} Hz with others beside it` };
  }
  if ((scan.tone?.levelSpreadDb ?? 0) > STEADY_DB) return { found: 'a tone that changes its level' };
  const quarterOf = tone.levelDbfs > LOUD_QUARTER_DBFS ? rateOfQuarter(tone.frequencyHz) : null;
  if (quarterOf !== null) {
    return {
      measure: 'jitter',
      why: `it holds ${about}, a quarter of ${quarterOf} Hz as in the jitter test`,
    };
  }
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

/** The usual rate that a tone is a quarter of; null for another tone. */
function rateOfQuarter(frequencyHz: number): number | null {
  return USUAL_RATES_HZ.find((rate) => Math.abs((4 * frequencyHz) / rate - 1) < SAME_CLOCK) ?? null;
}

function acPower(scan: ChannelScan): number {
  return Math.max(0, scan.level.meanSquare - scan.level.mean ** 2);
}

function middleOf(range: FrameRange, atMost: number): FrameRange {
  const length = Math.min(range.to - range.from, Math.round(atMost));
  const from = range.from + ((range.to - range.from - length) >> 1);
  return { from, to: from + length };
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
