import { slotOf } from '@/components/charts/chart-model';
import type { ChartModel, HarmonicMark } from '@/components/charts/chart-model';
import { levelRange, peakNear } from '@/components/charts/spectrum-model';
import { channelName } from '@/lib/capture-words';
import { formatNumber, MINUS } from '@/lib/format/number';
import type { ServedBody } from '../api/record-queries';
import { channelIndex } from './read-trace';
import type { ReadTrace } from './read-trace';

/** How far from the tone is drawn, Hz. */
export const REACHES_HZ = ['5000', '1000', '250'] as const;
export type Reach = (typeof REACHES_HZ)[number];

export interface JitterPair {
  readonly channel: string;
  readonly offsetHz: number;
  readonly levelDbr: number;
  readonly kind: string;
}

/** Sideband pairs of all channels, as the record lists them. */
export function pairsOf({ channels }: Pick<ServedBody, 'channels'>): JitterPair[] {
  return channels.flatMap(({ channel, components }) =>
    components.flatMap(({ offsetHz, levelDbr, kind }) =>
      typeof offsetHz === 'number' && typeof levelDbr === 'number'
        ? [{ channel, offsetHz, levelDbr, kind: String(kind) }]
        : [],
    ),
  );
}

/** Close in around the tone: what stands beside it on both sides, pairs marked. */
export function jitterModel(body: ServedBody, traces: readonly ReadTrace[], reach: Reach): ChartModel {
  const reachHz = Number(reach);
  return {
    x: {
      quantity: 'Distance from the tone',
      unit: 'Hz',
      scale: 'linear',
      min: -reachHz,
      max: reachHz,
      isSigned: true,
    },
    y: {
      quantity: 'Level against the tone',
      unit: 'dBr',
      scale: 'linear',
      ...levelRange(traces.map(({ trace }) => trace)),
      // The tone itself is the zero; a window's ripple over it is no reason for another 20 dB.
      max: 0,
    },
    traces: traces.map(({ channel, trace }) => ({
      id: channel,
      name: channelName(channel),
      kind: 'spectrum',
      slot: slotOf(channelIndex(body, channel)),
      x: trace.x,
      y: trace.y,
    })),
    harmonics: pairMarks(body, traces),
    rulerWord: 'pairs',
  };
}

/** Two pairs of different channels so near to each other are one and the same. */
const SAME_OFFSET_HZ = 1;

function pairMarks(body: ServedBody, traces: readonly ReadTrace[]): HarmonicMark[] {
  const highest: JitterPair[] = [];
  for (const pair of pairsOf(body).sort((a, b) => b.levelDbr - a.levelDbr)) {
    if (!highest.some(({ offsetHz }) => Math.abs(offsetHz - pair.offsetHz) < SAME_OFFSET_HZ))
      highest.push(pair);
  }
  return highest.flatMap((pair, index) => {
    const trace = traces.find(({ channel }) => channel === pair.channel)?.trace;
    if (!trace) return [];
    const size = formatNumber(pair.offsetHz, { decimals: 0 });
    return [-1, 1].map((side): HarmonicMark => ({
      order: index + 2,
      label: `${side < 0 ? MINUS : '+'}${size}`,
      name: `pair at ${size} Hz, ${pair.kind}`,
      x: side * pair.offsetHz,
      y: peakNear(trace, side * pair.offsetHz),
      slot: slotOf(channelIndex(body, pair.channel)),
    }));
  });
}
