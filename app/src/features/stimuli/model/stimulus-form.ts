import { STIMULUS_KINDS, type StimulusBits, type StimulusKind, type StimulusOptions } from '@benchlark/dsp';

export const RATES_HZ = [44_100, 48_000, 88_200, 96_000, 176_400, 192_000] as const;

/** A stimulus as the page holds it: all of it stands in the address. */
export interface StimulusForm {
  readonly name: string;
  readonly options: StimulusOptions;
}

const DEFAULT_NAME = 'programme';
const DEFAULT_RATE_HZ = 96_000;

/** Numbers that stand in the address, by their key there. */
const NUMBERS = {
  level: 'levelDbfs',
  ceiling: 'ceilingDbfs',
  frequency: 'frequencyHz',
  low: 'lowFrequencyHz',
  high: 'highFrequencyHz',
  duration: 'durationS',
  seed: 'seed',
} as const satisfies Record<string, keyof StimulusOptions>;

export type NumberKey = keyof typeof NUMBERS;

export function kindOf(name: string): StimulusKind {
  const kind = STIMULUS_KINDS.find((entry) => entry.name === name) ?? STIMULUS_KINDS[0];
  if (kind === undefined) throw new TypeError('there are no stimuli');
  return kind;
}

function readBits(text: string | null): StimulusBits {
  return text === '16' ? 16 : text === '32f' ? '32f' : 24;
}

/** Reads the address; what isn't there or makes no sense takes its default. */
export function readForm(params: URLSearchParams): StimulusForm {
  const asked = params.get('name') ?? DEFAULT_NAME;
  const kind = STIMULUS_KINDS.find(({ name }) => name === asked) ?? kindOf(DEFAULT_NAME);
  const rate = Number(params.get('rate') ?? DEFAULT_RATE_HZ);
  const numbers = Object.entries(NUMBERS).flatMap(([key, option]): [string, number][] => {
    const text = params.get(key);
    const value = Number(text);
    return text === null || text === '' || !Number.isFinite(value) ? [] : [[option, value]];
  });
  const channels = params.get('channels');
  return {
    name: kind.name,
    options: {
      sampleRateHz: Number.isInteger(rate) && rate > 0 ? rate : DEFAULT_RATE_HZ,
      bitsPerSample: readBits(params.get('bits')),
      ...Object.fromEntries(numbers),
      ...(channels === 'left' || channels === 'right' ? { channels } : {}),
      ...(params.get('dither') === 'none' ? { dither: 'none' as const } : {}),
      ...(params.get('bare') === 'yes' ? { isBare: true } : {}),
      ...(params.get('form') === 'quick' && kind.defaults.isQuick !== undefined ? { isQuick: true } : {}),
    },
  };
}

/** What stays when another stimulus is chosen: the file's form, not the signal's. */
const KEPT = ['rate', 'bits', 'bare', 'ceiling'];

/** The address of another stimulus. */
export function withName(params: URLSearchParams, name: string): URLSearchParams {
  const next = new URLSearchParams();
  next.set('name', name);
  for (const key of KEPT) {
    const value = params.get(key);
    if (value !== null) next.set(key, value);
  }
  return next;
}

/** The address with one word of the sentence changed; null takes the default again. */
export function withWord(params: URLSearchParams, key: string, value: string | null): URLSearchParams {
  const next = new URLSearchParams(params);
  if (value === null) next.delete(key);
  else next.set(key, value);
  return next;
}

/** Which word of the sentence a refusal of dsp is about: it names the parameter in its message. */
export function refusedKey(message: string): NumberKey | 'rate' | 'dither' | 'channels' | null {
  if (message.includes('sample rate')) return 'rate';
  if (message.includes('low frequency')) return 'low';
  if (message.includes('high frequency')) return 'high';
  if (message.includes('the frequency')) return 'frequency';
  if (message.includes('the level')) return 'level';
  if (message.includes('the ceiling')) return 'ceiling';
  if (message.includes('the duration')) return 'duration';
  if (message.includes('the seed')) return 'seed';
  if (message.includes('dither')) return 'dither';
  return message.includes('channels') ? 'channels' : null;
}

/** Parts of a file's name that tell a signal from the usual one of its kind. */
function ownWords({ name, options }: StimulusForm): string[] {
  const { defaults } = kindOf(name);
  const number = (value: number): string => String(value).replace('.', '_').replace('-', 'minus');
  const { lowFrequencyHz, highFrequencyHz, levelDbfs, ceilingDbfs, durationS, channels } = options;
  const isPair = lowFrequencyHz !== undefined || highFrequencyHz !== undefined;
  return [
    options.frequencyHz === undefined ? null : `${number(options.frequencyHz)}hz`,
    isPair
      ? `${number(lowFrequencyHz ?? defaults.lowFrequencyHz ?? 0)}-${number(highFrequencyHz ?? defaults.highFrequencyHz ?? 0)}hz`
      : null,
    levelDbfs === undefined ? null : `${number(levelDbfs)}db`,
    ceilingDbfs === undefined ? null : `max${number(ceilingDbfs)}db`,
    durationS === undefined ? null : `${number(durationS)}s`,
    channels === undefined || channels === 'both' ? null : channels,
    options.dither === 'none' ? 'undithered' : null,
    options.seed === undefined ? null : `seed${options.seed}`,
  ].filter((word) => word !== null);
}

/** "level-steps-96k-24bit.wav"; what differs from the usual stands in the name, so that no two signals share one. */
export function fileNameOf(form: StimulusForm): string {
  const { sampleRateHz, bitsPerSample, isQuick, isBare } = form.options;
  const rate = `${sampleRateHz / 1000}k`.replace('.', '_');
  const bits = bitsPerSample === '32f' ? 'float' : `${bitsPerSample}bit`;
  const words = [form.name, isQuick ? 'quick' : null, rate, bits, ...ownWords(form), isBare ? 'bare' : null];
  return `${words.filter((word) => word !== null).join('-')}.wav`;
}
