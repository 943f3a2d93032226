import { DspInputError } from '../errors.js';
import type { WavDither } from '../wav/encode-samples.js';
import type { StimulusBits, StimulusChannels } from './descriptor.js';
import { STIMULUS_KINDS, type StimulusKind } from './stimulus-kinds.js';

export interface StimulusOptions {
  /** Whole number, 44,100 to 192,000. */
  readonly sampleRateHz: number;
  readonly bitsPerSample: StimulusBits;
  /** TPDF at 16 and 24 bits unless left out here, `none` for digital zero and for floats. */
  readonly dither?: WavDither;
  /** Whole number, 0 to 2^32 - 1; kept in the descriptor. */
  readonly seed?: number;
  readonly frequencyHz?: number;
  /** The top level, its peak as that of a sine; -160 to 0. */
  readonly levelDbfs?: number;
  /** Of the body with its ramps, 0.2 to 3,600. */
  readonly durationS?: number;
  readonly channels?: StimulusChannels;
  /** Leaves lead-in and marks out. */
  readonly isBare?: boolean;
  /** No level in the file goes beyond it; -160 to 0. */
  readonly ceilingDbfs?: number;
}

/** Options with every gap filled and every value checked. */
export interface ResolvedOptions {
  readonly kind: StimulusKind;
  readonly sampleRateHz: number;
  readonly bitsPerSample: StimulusBits;
  readonly dither: WavDither;
  readonly seed: number;
  /** Null for digital zero. */
  readonly tone: { readonly frequencyHz: number; readonly levelDbfs: number } | null;
  readonly durationS: number;
  readonly channels: StimulusChannels;
  readonly isBare: boolean;
  readonly ceilingDbfs: number | null;
}

export const LOWEST_LEVEL_DBFS = -160;
export const LOWEST_STIMULUS_RATE_HZ = 44_100;
export const HIGHEST_STIMULUS_RATE_HZ = 192_000;
const SHORTEST_S = 0.2;
const LONGEST_S = 3600;
const DEFAULT_SEED = 1;
/** Share of the rate up to which a tone is made. */
const HIGHEST_TONE_SHARE = 0.49;

function refuse(what: string, wanted: string, found: unknown): never {
  throw new DspInputError('OUT_OF_RANGE', `${what} must be ${wanted}, not ${String(found)}`);
}

function checkRange(what: string, value: number, low: number, high: number, unit: string): number {
  if (!(value >= low && value <= high)) refuse(what, `from ${low} to ${high} ${unit}`, value);
  return value;
}

function checkWhole(what: string, value: number, low: number, high: number): number {
  if (!Number.isInteger(value) || value < low || value > high) {
    refuse(what, `a whole number from ${low} to ${high}`, value);
  }
  return value;
}

function checkChoice<T>(what: string, value: T, allowed: readonly T[]): T {
  if (!allowed.includes(value)) refuse(what, `one of ${allowed.map(String).join(', ')}`, value);
  return value;
}

function resolveDither(kind: StimulusKind, options: StimulusOptions): WavDither {
  const isPlain = kind.isDigitalZero || options.bitsPerSample === '32f';
  const chosen = options.dither ?? (isPlain ? 'none' : 'tpdf');
  const dither = checkChoice<WavDither>('dither', chosen, ['tpdf', 'none']);
  if (isPlain && dither === 'tpdf') {
    refuse('dither', `none for ${kind.isDigitalZero ? 'digital zero' : 'floating-point samples'}`, dither);
  }
  return dither;
}

function resolveTone(kind: StimulusKind, options: StimulusOptions): ResolvedOptions['tone'] {
  if (kind.tone === null) {
    if (options.frequencyHz !== undefined)
      refuse('the frequency', 'left out for digital zero', options.frequencyHz);
    if (options.levelDbfs !== undefined) refuse('the level', 'left out for digital zero', options.levelDbfs);
    return null;
  }
  const highestHz = HIGHEST_TONE_SHARE * options.sampleRateHz;
  const frequencyHz = options.frequencyHz ?? kind.tone.frequencyHz;
  const levelDbfs = options.levelDbfs ?? kind.tone.levelDbfs;
  checkRange('the level', levelDbfs, LOWEST_LEVEL_DBFS, 0, 'dBFS');
  return {
    frequencyHz: checkRange('the frequency', frequencyHz, 1, highestHz, 'Hz'),
    levelDbfs: Math.min(levelDbfs, options.ceilingDbfs ?? 0),
  };
}

/**
 * Checks what was asked for and fills the rest with the stimulus's defaults.
 *
 * @throws DspInputError `UNKNOWN_NAME` for a name that isn't one of `STIMULUS_NAMES`; `OUT_OF_RANGE` for a parameter
 *   that can't be, naming it
 */
export function resolveStimulusOptions(name: string, options: StimulusOptions): ResolvedOptions {
  const kind = STIMULUS_KINDS.find((entry) => entry.name === name);
  if (!kind) {
    const names = STIMULUS_KINDS.map((entry) => entry.name).join(', ');
    throw new DspInputError('UNKNOWN_NAME', `there is no stimulus "${name}"; there are ${names}`);
  }
  const { sampleRateHz, bitsPerSample, ceilingDbfs } = options;
  checkWhole('the sample rate', sampleRateHz, LOWEST_STIMULUS_RATE_HZ, HIGHEST_STIMULUS_RATE_HZ);
  checkChoice('the bits', bitsPerSample, [16, 24, '32f']);
  if (ceilingDbfs !== undefined) checkRange('the ceiling', ceilingDbfs, LOWEST_LEVEL_DBFS, 0, 'dBFS');
  const durationS = options.durationS ?? kind.durationS;
  return {
    kind,
    sampleRateHz,
    bitsPerSample,
    dither: resolveDither(kind, options),
    seed: checkWhole('the seed', options.seed ?? DEFAULT_SEED, 0, 0xffffffff),
    tone: resolveTone(kind, options),
    durationS: checkRange('the duration', durationS, SHORTEST_S, LONGEST_S, 's'),
    channels: checkChoice('the channels', options.channels ?? 'both', ['both', 'left', 'right']),
    isBare: options.isBare ?? false,
    ceilingDbfs: ceilingDbfs ?? null,
  };
}
