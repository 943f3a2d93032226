import type { ChartModel, HarmonicMark } from '@/components/charts/chart-model';
import { slotOf } from '@/components/charts/chart-model';
import { peakNear, type SpectrumChannel, spectrumModel } from '@/components/charts/spectrum-model';
import { channelName } from '@/lib/capture-words';
import type { ServedBody } from '../api/record-queries';
import { productName } from './product-name';
import { channelIndex } from './read-trace';
import type { ReadTrace } from './read-trace';

/** How frequency is laid out: by octaves, evenly, or close in around the high tone. */
export type TwoToneAxis = 'octaves' | 'even' | 'around';

export interface Product {
  readonly channel: string;
  readonly name: string;
  readonly frequencyHz: number;
  readonly levelDbr: number;
}

/** Products of all channels, as the record lists them. */
export function productsOf({ channels }: Pick<ServedBody, 'channels'>): Product[] {
  return channels.flatMap(({ channel, components }) =>
    components.flatMap(({ lowOrder, highOrder, frequencyHz, levelDbr }) =>
      typeof lowOrder === 'number' &&
      typeof highOrder === 'number' &&
      typeof frequencyHz === 'number' &&
      typeof levelDbr === 'number'
        ? [{ channel, name: productName(lowOrder, highOrder), frequencyHz, levelDbr }]
        : [],
    ),
  );
}

/** Sidebands of a low tone are told apart close in only; difference tones lie far apart on an even axis. */
export function usualTwoToneAxis({ channels }: Pick<ServedBody, 'channels'>): TwoToneAxis {
  return channels.some(({ figures }) => 'modulationDistortionDb' in figures) ? 'around' : 'even';
}

const HIGHEST_SHOWN_HZ = 24_000;
/** Products to the fourth order lie three low tones away; a half more for air. */
const AROUND_LOW_TONES = 3.5;

/** The spectrum of two tones, each product with its name over the frame and a disc on its peak. */
export function twoToneModel(body: ServedBody, traces: readonly ReadTrace[], axis: TwoToneAxis): ChartModel {
  const channels = traces.map(({ channel, trace }) => ({
    name: channelName(channel),
    x: trace.x,
    y: trace.y,
  }));
  const model = spectrumModel({ channels });
  const range = axisRange(body, channels, axis);
  return {
    ...model,
    x: range ? { ...model.x, scale: 'linear', ...range } : model.x,
    harmonics: productMarks(body, traces),
    rulerWord: 'products',
  };
}

function axisRange(body: ServedBody, channels: readonly SpectrumChannel[], axis: TwoToneAxis) {
  if (axis === 'octaves') return null;
  const highest = channels.reduce((top, { x }) => Math.max(top, x[x.length - 1] ?? 0), 0);
  const whole = { min: 0, max: highest > 0 ? Math.min(HIGHEST_SHOWN_HZ, highest) : HIGHEST_SHOWN_HZ };
  if (axis === 'even') return whole;
  const figures = body.channels.find(
    (one) => typeof one.figures['highToneFrequencyHz'] === 'number',
  )?.figures;
  const low = figures?.['lowToneFrequencyHz'];
  const high = figures?.['highToneFrequencyHz'];
  if (typeof low !== 'number' || typeof high !== 'number') return whole;
  const reach = Math.min(AROUND_LOW_TONES * low, high);
  return { min: high - reach, max: high + reach };
}

/** One mark a product, on the channel in which it is highest, as one curve is read at a time. */
function productMarks(body: ServedBody, traces: readonly ReadTrace[]): HarmonicMark[] {
  const products = productsOf(body);
  const names = [...new Set(products.map(({ name }) => name))];
  return names.flatMap((name, index): HarmonicMark[] => {
    const [highest] = products.filter((one) => one.name === name).sort((a, b) => b.levelDbr - a.levelDbr);
    const trace = traces.find(({ channel }) => channel === highest?.channel)?.trace;
    if (!highest || !trace) return [];
    return [
      {
        order: index + 2,
        label: name,
        name: `product ${name}`,
        x: highest.frequencyHz,
        y: peakNear(trace, highest.frequencyHz),
        slot: slotOf(channelIndex(body, highest.channel)),
      },
    ];
  });
}
