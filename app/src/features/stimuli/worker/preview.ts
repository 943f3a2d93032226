import {
  createRealFft,
  createStimulus,
  createWavEncoder,
  createWindow,
  type StimulusDescriptor,
  type StimulusOptions,
} from '@benchlark/dsp';
import type { WaveformOverview } from '@/components/waveform/waveform-drawing';

/** What a stimulus will be, without making all of it. */
export interface StimulusPreview {
  readonly descriptor: StimulusDescriptor;
  readonly durationS: number;
  readonly sizeBytes: number;
  /** The whole file. */
  readonly overview: WaveformOverview;
  /** The beginning of the body, where its first wave can be seen: seconds in the file, linear. */
  readonly beginning: { readonly x: Float64Array; readonly y: Float64Array };
  /** Level spectrum of the body: Hz, dBFS; empty for digital zero. */
  readonly spectrum: { readonly x: Float64Array; readonly y: Float64Array };
}

const COLUMNS = 500;
/** Looked at in each column: a period of the lowest tones, and no more of a long file than this. */
const COLUMN_FRAMES = 4096;
const BEGINNING_PERIODS = 4;
const LONGEST_BEGINNING_S = 0.08;
const LONGEST_SPECTRUM = 262_144;
const WINDOW = 'blackman-harris-7';
const FLOOR_DBFS = -180;

/** @throws DspInputError naming the parameter that can't be */
export async function previewStimulus(name: string, options: StimulusOptions): Promise<StimulusPreview> {
  const stimulus = createStimulus(name, options);
  const { source, encoding } = stimulus;
  const descriptor = stimulus.describe('');
  const { frameCount, sampleRateHz, channelCount } = source;
  const { sizeBytes } = createWavEncoder({ ...encoding, sampleRateHz, channelCount, frameCount });
  const min = Array.from({ length: channelCount }, () => new Array<number>(COLUMNS).fill(0));
  const max = Array.from({ length: channelCount }, () => new Array<number>(COLUMNS).fill(0));
  for (let column = 0; column < COLUMNS; column += 1) {
    const from = Math.floor((column * frameCount) / COLUMNS);
    const until = Math.floor(((column + 1) * frameCount) / COLUMNS);
    const block = await source.read(from, Math.min(COLUMN_FRAMES, until - from));
    block.forEach((samples, channel) => {
      let [least, most] = [0, 0];
      for (const value of samples) {
        if (value < least) least = value;
        if (value > most) most = value;
      }
      const [lows, highs] = [min[channel], max[channel]];
      if (lows) lows[column] = least;
      if (highs) highs[column] = most;
    });
  }
  return {
    descriptor,
    durationS: frameCount / sampleRateHz,
    sizeBytes,
    overview: { channels: min.map((lows, channel) => ({ min: lows, max: max[channel] ?? [] })) },
    beginning: await readBeginning(source, descriptor),
    spectrum: await readSpectrum(source, descriptor),
  };
}

type Source = ReturnType<typeof createStimulus>['source'];

function channelOf({ parts }: StimulusDescriptor): number {
  return parts[0]?.channels === 'right' ? 1 : 0;
}

async function readBeginning(source: Source, descriptor: StimulusDescriptor) {
  const { sampleRateHz } = source;
  const [part] = descriptor.parts;
  const lowest = ['frequencyHz', 'lowFrequencyHz']
    .map((key) => part?.parameters[key])
    .find((value) => typeof value === 'number');
  const seconds = Math.min(LONGEST_BEGINNING_S, BEGINNING_PERIODS / Number(lowest ?? 100) + 0.005);
  const from = Math.round((part?.fromS ?? 0) * sampleRateHz);
  const block = await source.read(Math.min(from, source.frameCount), Math.round(seconds * sampleRateHz));
  const y = block[channelOf(descriptor)] ?? new Float64Array(0);
  return { x: Float64Array.from(y, (_, n) => (1000 * n) / sampleRateHz), y };
}

async function readSpectrum(source: Source, descriptor: StimulusDescriptor) {
  const { sampleRateHz } = source;
  const [part] = descriptor.parts;
  const empty = { x: new Float64Array(0), y: new Float64Array(0) };
  if (!part || part.measure === 'idle') return empty;
  // Of steps the loudest says most; of anything else, all of it.
  const { fromS, toS } = part.steps[0] ?? part;
  const from = Math.round(fromS * sampleRateHz);
  const available = Math.round((toS - fromS) * sampleRateHz);
  const length = Math.min(LONGEST_SPECTRUM, 2 ** Math.floor(Math.log2(Math.max(2, available))));
  const samples = (await source.read(from, length))[channelOf(descriptor)];
  if (!samples || samples.length < length) return empty;
  const window = createWindow(WINDOW, length);
  const re = new Float64Array(length / 2 + 1);
  const im = new Float64Array(length / 2 + 1);
  createRealFft(length).transform(
    samples.map((value, n) => value * (window.samples[n] ?? 0)),
    re,
    im,
  );
  const scale = 2 / (length * window.coherentGain);
  const y = re.map((value, k) =>
    Math.max(FLOOR_DBFS, 20 * Math.log10(Math.max(1e-12, scale * Math.hypot(value, im[k] ?? 0)))),
  );
  return { x: Float64Array.from(y, (_, k) => (k * sampleRateHz) / length), y };
}
