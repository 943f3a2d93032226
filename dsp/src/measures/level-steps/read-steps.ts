import type { CaptureFacts, SampleSource } from '../../source/sample-source.js';
import { sumBand } from '../../spectrum/integrate-band.js';
import { removeLobes, type Lobe } from '../../spectrum/remove-lobes.js';
import type { AnalysisContext } from '../measure.js';
import { isOverloaded } from '../shared/describe-recording.js';
import type { Band } from '../shared/settings-band.js';
import { createStepReader, type StepReader, type StepReading } from '../shared/steps/create-step-reader.js';
import type { PlacedStep } from '../shared/steps/place-steps.js';
import { throwIfCancelled } from '../shared/stream-frames.js';
import { harmonicOrders } from '../tone/distortion.js';
import { extremesOf } from './wave-extremes.js';

/** One step of one channel taken apart; powers in FS². */
export interface LevelStep {
  readonly stimulusDbfs: number;
  /** null where the tone is lost in the noise. */
  readonly tone: number | null;
  /** Standard uncertainty of the tone's level by noise, dB. */
  readonly deviationDb: number;
  /** Sum of the harmonics out of the noise; null when there is none. */
  readonly harmonics: number | null;
  /** Power of each harmonic out of the noise, by order. */
  readonly orders: ReadonlyMap<number, number>;
  /** All in the band but the tone. */
  readonly residual: number;
  /** All in the band but the tone and its harmonics. */
  readonly noise: number;
  /** Greatest and least value of the wave without noise, FS; null where noise hides its shape. */
  readonly extremes: { readonly positive: number; readonly negative: number } | null;
  readonly isOverloaded: boolean;
  readonly clippedRunCount: number;
}

/** Steps played at least so loud tell the tone's frequency. */
const TELLING_DB = 40;
/** A harmonic below twice the scatter of the noise in its lobe is not told from it. */
const SIGNIFICANCE = 2;
/** A tone's power over the noise in the bandwidth it is read in: noise alone goes beyond once in fifty times. */
const LEAST_TONE = 4;
/** Above this the lobe as a whole is read: what the clock does within a step then costs nothing. */
const CLEAR_TONE = 1e4;
/** dB that one relative standard deviation of an amplitude makes. */
const DB_PER_RELATIVE = 20 / Math.LN10;

/**
 * Reads every step of every channel.
 *
 * @param nominalHz - the tone as it lies in the recording, within a percent
 * @returns one array a channel; a channel without a tone has null
 */
export async function readLevelSteps(
  source: SampleSource,
  steps: readonly PlacedStep[],
  nominalHz: number,
  band: Pick<Band, 'lowHz' | 'highHz'>,
  highestHarmonic: number,
  context: Pick<AnalysisContext, 'signal'> & { readonly capture: CaptureFacts },
  onShare: (share: number) => void,
): Promise<{ channels: (readonly LevelStep[] | null)[]; frequencyHz: number | null }> {
  const reader = createStepReader(source.sampleRateHz, context.capture);
  const top = Math.max(...steps.map(({ levelDbfs }) => levelDbfs));
  const order = [...steps.keys()].sort((one, other) => steps[other].levelDbfs - steps[one].levelDbfs);
  const channels = Array.from({ length: source.channelCount }, () => new Map<number, LevelStep>());
  const seen: number[] = [];
  // The loud steps come first: they say where the tone of the quiet ones lies.
  for (const [done, index] of order.entries()) {
    throwIfCancelled(context);
    const { levelDbfs, range } = steps[index];
    const block = await source.read(range.from, range.to - range.from);
    const isTelling = levelDbfs >= top - TELLING_DB;
    const frequencyHz = seen.length > 0 ? median(seen) : nominalHz;
    block.forEach((samples, channel) => {
      const reading = reader.read(samples, isTelling ? frequencyHz : null);
      if (reading.tone !== null) seen.push(reading.tone.frequencyHz);
      const step = takeStepApart(reader, samples, reading, seen.length > 0 ? median(seen) : null, {
        levelDbfs,
        band,
        highestHarmonic,
        capture: context.capture,
      });
      if (step !== null) channels[channel].set(index, step);
    });
    onShare((done + 1) / order.length);
  }
  return {
    frequencyHz: seen.length > 0 ? median(seen) : null,
    channels: channels.map((found) => {
      const list = [...found].sort(([one], [other]) => one - other).map(([, step]) => step);
      return list.some(({ tone }) => tone !== null) ? list : null;
    }),
  };
}

interface StepFacts {
  readonly levelDbfs: number;
  readonly band: Pick<Band, 'lowHz' | 'highHz'>;
  readonly highestHarmonic: number;
  readonly capture: CaptureFacts;
}

function takeStepApart(
  reader: StepReader,
  samples: Float64Array,
  reading: StepReading,
  frequencyHz: number | null,
  { levelDbfs, band, highestHarmonic, capture }: StepFacts,
): LevelStep | null {
  if (frequencyHz === null) return null;
  const { spectrum, level } = reading;
  const orders = harmonicOrders(spectrum, frequencyHz, band, highestHarmonic);
  const places = [frequencyHz, ...orders.map((order) => order * frequencyHz)];
  const { lobes, power } = removeLobes(spectrum, places);
  const tone = readTone(reader, samples, lobes[0], frequencyHz, spectrum.binWidthHz);
  const present = orders
    .map((order, index) => ({ order, lobe: lobes[index + 1] }))
    .filter(({ lobe }) => lobe.power >= SIGNIFICANCE * lobe.standardDeviation && lobe.power > 0);
  const noise = sumBand(spectrum, band.lowHz, band.highHz, { power });
  const harmonics = present.reduce((sum, { lobe }) => sum + lobe.power, 0);
  // One of many places stands out by chance alone: together they must stand out of all their noise.
  const scatter = Math.sqrt(
    lobes.slice(1).reduce((sum, { bins, noisePerBin }) => sum + (bins * noisePerBin) ** 2, 0),
  );
  // Harmonics that stand in the noise are noise: what their lobes hold beyond its mean is scatter.
  const residual = noise + lobes.slice(1).reduce((sum, lobe) => sum + lobe.power, 0);
  return {
    stimulusDbfs: levelDbfs,
    ...tone,
    harmonics: harmonics > SIGNIFICANCE * scatter && harmonics > 0 ? harmonics : null,
    orders: new Map(present.map(({ order, lobe }) => [order, lobe.power])),
    residual: Math.max(residual, noise, 0),
    noise,
    extremes: reading.tone === null ? null : extremesOf(reading.tone, lobes[0], highestHarmonic),
    isOverloaded: isOverloaded({ level, tone: { frequencyHz } }, capture),
    clippedRunCount: level.clippedRunCount,
  };
}

function readTone(
  reader: StepReader,
  samples: Float64Array,
  lobe: Lobe,
  frequencyHz: number,
  binWidthHz: number,
): Pick<LevelStep, 'tone' | 'deviationDb'> {
  const noise = (lobe.noisePerBin / binWidthHz) * reader.bandwidthOf(samples);
  const isClear = lobe.power > CLEAR_TONE * lobe.noisePerBin * lobe.bins;
  const power = isClear ? lobe.power : reader.powerAt(samples, frequencyHz) - noise;
  // @see Cramér-Rao bound of an amplitude in white noise: a relative 1/√(2R) of it at a power ratio R.
  const deviationDb = power > 0 ? (DB_PER_RELATIVE * Math.sqrt(noise / power)) / Math.SQRT2 : Infinity;
  return power > LEAST_TONE * noise && power > 0
    ? { tone: power, deviationDb }
    : { tone: null, deviationDb: Infinity };
}

function median(values: readonly number[]): number {
  const sorted = [...values].sort((one, other) => one - other);
  return sorted[sorted.length >> 1];
}
