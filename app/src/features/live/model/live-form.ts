import { STIMULUS_KINDS, type StimulusOptions } from '@benchlark/dsp';
import { signalOf, type SignalKind } from './take-kinds';

/** What the sentence of the Live page says. */
export interface LiveForm {
  readonly signalId: string;
  readonly frequencyHz: number;
  readonly lowFrequencyHz: number;
  readonly highFrequencyHz: number;
  readonly levelDbfs: number;
  readonly channels: 'both' | 'left' | 'right';
  readonly spanId: SpanId;
  readonly fftLength: number;
  readonly averages: number;
  /** How often a take is repeated. */
  readonly times: number;
}

/** What is looked at: the band of the figures, and the part of it that is drawn. */
export const SPANS = [
  { id: 'audible', label: '20 Hz to 20 kHz', bandHz: [20, 20_000], isClose: false },
  { id: 'low', label: '10 Hz to 22 kHz', bandHz: [10, 22_000], isClose: false },
  { id: 'wide', label: '10 Hz to 80 kHz', bandHz: [10, 80_000], isClose: false },
  { id: 'close', label: 'close in around the tone', bandHz: [20, 20_000], isClose: true },
] as const;

export type SpanId = (typeof SPANS)[number]['id'];

export function spanOf({ spanId }: Pick<LiveForm, 'spanId'>): (typeof SPANS)[number] {
  return SPANS.find(({ id }) => id === spanId) ?? SPANS[0];
}

export const DEFAULT_FORM: LiveForm = {
  signalId: 'tone',
  frequencyHz: 997,
  lowFrequencyHz: 60,
  highFrequencyHz: 7000,
  levelDbfs: -20,
  channels: 'both',
  spanId: 'audible',
  fftLength: 65_536,
  averages: 8,
  times: 1,
};

export const FFT_LENGTHS = [16_384, 32_768, 65_536, 131_072, 262_144] as const;
export const AVERAGES = [1, 2, 4, 8, 16, 32] as const;

/** A signal and the lower of the form's level and the rig's limit. */
export function cappedLevelDbfs(form: LiveForm, limitDbfs: number): number {
  return Math.min(form.levelDbfs, limitDbfs, 0);
}

/** Tones of a steady signal, Hz; of a pair the low and the high one. */
export function tonesOf(form: LiveForm): number[] {
  const { signalId } = form;
  if (signalId === 'tone') return [form.frequencyHz];
  return signalId === 'pair' ? [form.lowFrequencyHz, form.highFrequencyHz] : [];
}

/** A peak that leaves the level of a pair as that of a sine of the same peak: 4 to 1, the SMPTE ratio of RP 120. */
export function steadyTones(form: LiveForm, levelDbfs: number): { frequencyHz: number; peak: number }[] {
  const peak = 10 ** (levelDbfs / 20);
  if (form.signalId !== 'pair') return [{ frequencyHz: form.frequencyHz, peak }];
  return [
    { frequencyHz: form.lowFrequencyHz, peak: 0.8 * peak },
    { frequencyHz: form.highFrequencyHz, peak: 0.2 * peak },
  ];
}

/** What the stimulus of a take is made from: only what its kind can be told. */
export function stimulusOptions(
  form: LiveForm,
  signal: SignalKind,
  { sampleRateHz, limitDbfs }: { sampleRateHz: number; limitDbfs: number },
): Omit<StimulusOptions, 'bitsPerSample' | 'dither'> {
  const kind = STIMULUS_KINDS.find(({ name }) => name === signal.stimulus);
  const levelDbfs = Math.min(form.levelDbfs, kind?.highestLevelDbfs ?? 0);
  return {
    sampleRateHz,
    ...(kind?.defaults.frequencyHz === undefined ? {} : { frequencyHz: form.frequencyHz }),
    ...(hasLevel(signal) ? { levelDbfs } : {}),
    ...(limitDbfs < 0 && kind && !kind.isDigitalZero ? { ceilingDbfs: limitDbfs } : {}),
    ...(kind && !kind.isBothOnly && form.channels !== 'both' ? { channels: form.channels } : {}),
    ...signal.options,
  };
}

/** Whether the sentence sets the level of this signal; the programme's parts and a quiet tone have levels of their own. */
export function hasLevel({ stimulus }: SignalKind): boolean {
  if (stimulus === null) return true;
  const kind = STIMULUS_KINDS.find(({ name }) => name === stimulus);
  return kind?.defaults.levelDbfs !== undefined && stimulus !== 'programme' && stimulus !== 'low-level-tone';
}

export function isTake(form: LiveForm): boolean {
  return signalOf(form.signalId).stimulus !== null;
}
