import { formatNumber } from '@/lib/format/number';
import { formatFrequency, formatLevel, formatOrdinal } from '@/lib/format/quantity';
import { type ChartModel, type ChartNote, type HarmonicMark, slotOf, type TraceModel } from './chart-model';
import { lowerBound } from './decimate';

export interface SpectrumChannel {
  readonly name: string;
  /** Hz, ascending. */
  readonly x: Float64Array;
  /** dBFS. */
  readonly y: Float64Array;
}

export interface SpectrumHarmonic {
  readonly channel: string;
  readonly order: number;
  readonly frequencyHz: number;
  /** Against the fundamental; null where it stands in the noise. */
  readonly levelDbr: number | null;
}

export interface SpectrumParts {
  readonly channels: readonly SpectrumChannel[];
  readonly rigAlone?: Pick<SpectrumChannel, 'x' | 'y'> | null;
  readonly fundamentalHz?: number | null;
  readonly harmonics?: readonly SpectrumHarmonic[];
  readonly bandHz?: readonly [number, number];
  /** Shown range of levels, dBFS; found from the data when left out. */
  readonly levelsDbfs?: readonly [number, number];
  /** Spectra of before, thinner, each in its channel's slot. */
  readonly references?: readonly SpectrumChannel[];
  readonly notes?: readonly ChartNote[];
}

const LOWEST_SHOWN_HZ = 20;
const LEVEL_STEP_DB = 20;
/** Below this nothing is measured, only computed. */
const DEEPEST_DBFS = -200;

/** Level of the bin nearest to a frequency, or of the greatest of it and its neighbours: the lobe's top. */
export function peakNear({ x, y }: Pick<SpectrumChannel, 'x' | 'y'>, frequencyHz: number): number | null {
  const at = lowerBound(x, frequencyHz);
  const near = y.subarray(Math.max(0, at - 3), at + 4);
  return near.length === 0 ? null : near.reduce((greatest, level) => Math.max(greatest, level), -Infinity);
}

/** Enough of a spectrum's points to know where its noise lies. */
const SAMPLED_POINTS = 2000;

/** From a little under the noise to the next 20 dB over the highest line. */
export function levelRange(channels: readonly Pick<SpectrumChannel, 'y'>[]): { min: number; max: number } {
  let highest = -Infinity;
  const sampled: number[] = [];
  for (const { y } of channels) {
    const step = Math.max(1, Math.floor(y.length / SAMPLED_POINTS));
    for (let index = 0; index < y.length; index += 1) {
      const level = y[index] ?? NaN;
      if (level > highest) highest = level;
      if (index % step === 0 && Number.isFinite(level)) sampled.push(level);
    }
  }
  const sorted = Float64Array.from(sampled).sort();
  const low = sorted[Math.floor(sorted.length * 0.01)] ?? -160;
  const max = Math.max(
    0,
    Math.ceil((Number.isFinite(highest) ? highest : 0) / LEVEL_STEP_DB) * LEVEL_STEP_DB,
  );
  const min = Math.max(DEEPEST_DBFS, Math.floor((low - 5) / LEVEL_STEP_DB) * LEVEL_STEP_DB);
  return { min: Math.min(min, max - 100), max };
}

export function spectrumModel(parts: SpectrumParts): ChartModel {
  const {
    channels,
    rigAlone,
    fundamentalHz,
    harmonics = [],
    bandHz,
    levelsDbfs,
    references = [],
    notes,
  } = parts;
  const traces: TraceModel[] = channels.map(({ name, x, y }, index) => ({
    id: name,
    name,
    kind: 'spectrum',
    slot: slotOf(index),
    x,
    y,
  }));
  references.forEach(({ name, x, y }, index) =>
    traces.push({
      id: `reference ${name}`,
      name,
      kind: 'spectrum',
      slot: slotOf(index + 2),
      x,
      y,
      isSecond: true,
    }),
  );
  if (rigAlone)
    traces.push({ id: 'rig-alone', name: 'rig alone', kind: 'floor', slot: 5, x: rigAlone.x, y: rigAlone.y });
  const highestHz = channels.reduce((top, { x }) => Math.max(top, x[x.length - 1] ?? 0), 0);
  const [lowHz, highHz] = bandHz ?? [LOWEST_SHOWN_HZ, highestHz > LOWEST_SHOWN_HZ ? highestHz : 20_000];
  return {
    x: { quantity: 'Frequency', unit: 'Hz', scale: 'log', min: lowHz, max: highHz },
    y: {
      quantity: 'Level',
      unit: 'dBFS',
      scale: 'linear',
      ...(levelsDbfs
        ? { min: levelsDbfs[0], max: levelsDbfs[1] }
        : levelRange([...channels, ...(rigAlone ? [rigAlone] : [])])),
    },
    traces,
    harmonics: harmonicMarks(channels, fundamentalHz ?? null, harmonics),
    notes,
  };
}

/** The fundamental and the orders; discs stand on the highest channel's peaks, as one curve is read at a time. */
function harmonicMarks(
  channels: readonly SpectrumChannel[],
  fundamentalHz: number | null,
  harmonics: readonly SpectrumHarmonic[],
): HarmonicMark[] {
  if (fundamentalHz === null) return [];
  const marks: HarmonicMark[] = [{ order: 1, x: fundamentalHz, y: null, slot: 1 }];
  const orders = [...new Set(harmonics.map(({ order }) => order))].sort((a, b) => a - b);
  for (const order of orders) {
    const same = harmonics.filter((harmonic) => harmonic.order === order);
    const found = same.map((harmonic) => {
      const index = channels.findIndex(({ name }) => name === harmonic.channel);
      const channel = channels[index];
      const y = channel && harmonic.levelDbr !== null ? peakNear(channel, harmonic.frequencyHz) : null;
      return { order, x: harmonic.frequencyHz, y, slot: slotOf(index) };
    });
    found.sort((a, b) => (b.y ?? -Infinity) - (a.y ?? -Infinity));
    if (found[0]) marks.push(found[0]);
  }
  return marks;
}

/** A sentence on each channel: its highest line, its strongest harmonics. */
export function spectrumInWords({
  channels,
  harmonics = [],
  model,
}: Pick<SpectrumParts, 'channels' | 'harmonics'> & { model: ChartModel }): string {
  const range = `Level in dBFS over frequency from ${formatFrequency(model.x.min)} to ${formatFrequency(model.x.max)}.`;
  const sentences = channels.map(({ name, x, y }) => {
    const from = lowerBound(x, model.x.min);
    const shown = y.subarray(from);
    const top = shown.reduce((best, level, index) => (level > (shown[best] ?? -Infinity) ? index : best), 0);
    const frequencyHz = x[from + top];
    if (frequencyHz === undefined) return `${name}: no points.`;
    const strongest = harmonics
      .filter((harmonic) => harmonic.channel === name && harmonic.levelDbr !== null)
      .sort((a, b) => (b.levelDbr ?? -Infinity) - (a.levelDbr ?? -Infinity))
      .slice(0, 3)
      .map(({ order, levelDbr }) => `${formatOrdinal(order)} ${formatLevel(levelDbr ?? NaN, 'dBr')}`);
    const highest = `highest line ${formatLevel(shown[top] ?? NaN)} at ${formatNumber(frequencyHz, { decimals: 0 })} Hz`;
    const products =
      strongest.length > 0 ? `strongest harmonics ${strongest.join(', ')}` : 'no harmonic clear of the noise';
    return `${name}: ${highest}; ${harmonics.length > 0 ? products : 'no harmonics marked'}.`;
  });
  return [range, ...sentences].join(' ');
}
