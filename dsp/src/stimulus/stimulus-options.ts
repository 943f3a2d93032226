import { DspInputError } from '../errors.js';
import type { WavDither } from '../wav/encode-samples.js';
import type { StimulusBits, StimulusChannels } from './descriptor.js';
import {
  findStimulusKind,
  STIMULUS_NAMES,
  type StimulusDefaults,
  type StimulusKind,
} from './stimulus-kinds.js';

export interface StimulusOptions {
  /** Whole number, 44,100 to 192,000. */
  readonly sampleRateHz: number;
  readonly bitsPerSample: StimulusBits;
  /** TPDF at 16 and 24 bits unless left out here; `none` for digital zero, the exact pattern and floats. */
  readonly dither?: WavDither;
  /** Whole number, 0 to 2^32 - 1; kept in the descriptor. */
  readonly seed?: number;
  readonly frequencyHz?: number;
  /** Of a pair. */
  readonly lowFrequencyHz?: number;
  readonly highFrequencyHz?: number;
  /** The top level, its peak as that of a sine (noise and square: RMS); -160 to 0. */
  readonly levelDbfs?: number;
  /** Of the body with its ramps, 0.2 to 3,600. */
  readonly durationS?: number;
  readonly channels?: StimulusChannels;
  /** Leaves lead-in and marks out. */
  readonly isBare?: boolean;
  /** No level in the file goes beyond it; -160 to 0. */
  readonly ceilingDbfs?: number;
  /** The short form of a programme. */
  readonly isQuick?: boolean;
}

/** Options with every gap filled and every value checked; null where the kind takes none. */
export interface ResolvedOptions {
  readonly kind: StimulusKind;
  readonly sampleRateHz: number;
  readonly bitsPerSample: StimulusBits;
  readonly dither: WavDither;
  readonly seed: number;
  readonly frequencyHz: number | null;
  readonly lowFrequencyHz: number | null;
  readonly highFrequencyHz: number | null;
  readonly levelDbfs: number | null;
  readonly durationS: number | null;
  readonly isQuick: boolean;
  readonly channels: StimulusChannels;
  readonly isBare: boolean;
  readonly ceilingDbfs: number | null;
}

export const LOWEST_LEVEL_DBFS = -160;
export const LOWEST_STIMULUS_RATE_HZ = 44_100;
export const HIGHEST_STIMULUS_RATE_HZ = 192_000;
const SHORTEST_S = 0.2;
const SHORTEST_SWEEP_S = 1;
const LONGEST_S = 3600;
const DEFAULT_SEED = 1;
/** Share of the rate up to which a tone is made. */
const HIGHEST_TONE_SHARE = 0.49;

const WORDS: Readonly<Record<keyof StimulusDefaults, string>> = {
  frequencyHz: 'the frequency',
  lowFrequencyHz: 'the low frequency',
  highFrequencyHz: 'the high frequency',
  levelDbfs: 'the level',
  durationS: 'the duration',
  isQuick: 'the short form',
};

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
  const isFloat = options.bitsPerSample === '32f';
  const dither = checkChoice<WavDither>(
    'dither',
    options.dither ?? (isFloat || !kind.isDithered ? 'none' : 'tpdf'),
    ['tpdf', 'none'],
  );
  if (dither === 'tpdf' && (isFloat || !kind.isDithered)) {
    refuse('dither', `none for ${isFloat ? 'floating-point samples' : `"${kind.name}"`}`, dither);
  }
  return dither;
}

/** Takes a value of a kind that has it; one that the kind hasn't is refused. */
function resolveValue(
  kind: StimulusKind,
  options: StimulusOptions,
  key: Exclude<keyof StimulusDefaults, 'isQuick'>,
  [low, high, unit]: readonly [number, number, string],
): number | null {
  const usual = kind.defaults[key];
  const asked = options[key];
  if (usual === undefined) {
    return asked === undefined ? null : refuse(WORDS[key], `left out for "${kind.name}"`, asked);
  }
  return checkRange(WORDS[key], asked ?? usual, low, high, unit);
}

function resolveTones(kind: StimulusKind, options: StimulusOptions) {
  const highestHz = HIGHEST_TONE_SHARE * options.sampleRateHz;
  const range = [1, highestHz, 'Hz'] as const;
  const frequencyHz = resolveValue(kind, options, 'frequencyHz', range);
  const lowFrequencyHz = resolveValue(kind, options, 'lowFrequencyHz', range);
  const highFrequencyHz = resolveValue(kind, options, 'highFrequencyHz', range);
  if (lowFrequencyHz !== null && highFrequencyHz !== null && lowFrequencyHz >= highFrequencyHz) {
    refuse(WORDS.highFrequencyHz, `above the low one of ${lowFrequencyHz} Hz`, highFrequencyHz);
  }
  return { frequencyHz, lowFrequencyHz, highFrequencyHz };
}

function resolveLevel(kind: StimulusKind, options: StimulusOptions): number | null {
  const range = [LOWEST_LEVEL_DBFS, kind.highestLevelDbfs, 'dBFS'] as const;
  const level = resolveValue(kind, options, 'levelDbfs', range);
  return level === null ? null : Math.min(level, options.ceilingDbfs ?? 0);
}

/**
 * Checks what was asked for and fills the rest with the stimulus's defaults.
 *
 * @throws DspInputError `UNKNOWN_NAME` for a name that isn't one of `STIMULUS_NAMES`; `OUT_OF_RANGE` for a parameter
 *   that can't be, naming it
 */
export function resolveStimulusOptions(name: string, options: StimulusOptions): ResolvedOptions {
  const kind = findStimulusKind(name);
  if (!kind) {
    throw new DspInputError(
      'UNKNOWN_NAME',
      `there is no stimulus "${name}"; there are ${STIMULUS_NAMES.join(', ')}`,
    );
  }
  const { sampleRateHz, bitsPerSample, ceilingDbfs } = options;
  checkWhole('the sample rate', sampleRateHz, LOWEST_STIMULUS_RATE_HZ, HIGHEST_STIMULUS_RATE_HZ);
  checkChoice('the bits', bitsPerSample, [16, 24, '32f']);
  if (ceilingDbfs !== undefined) checkRange('the ceiling', ceilingDbfs, LOWEST_LEVEL_DBFS, 0, 'dBFS');
  if (options.isQuick === true && kind.defaults.isQuick === undefined) {
    refuse(WORDS.isQuick, `left out for "${kind.name}"`, 'asked for');
  }
  const isSweep = kind.name === 'sweep' || kind.name === 'separation';
  const shortestS = isSweep ? SHORTEST_SWEEP_S : SHORTEST_S;
  return {
    kind,
    sampleRateHz,
    bitsPerSample,
    dither: resolveDither(kind, options),
    seed: checkWhole('the seed', options.seed ?? DEFAULT_SEED, 0, 0xffffffff),
    ...resolveTones(kind, options),
    levelDbfs: resolveLevel(kind, options),
    durationS: resolveValue(kind, options, 'durationS', [shortestS, LONGEST_S, 's']),
    isQuick: options.isQuick ?? false,
    channels: checkChoice(
      'the channels',
      options.channels ?? 'both',
      kind.isBothOnly ? ['both'] : ['both', 'left', 'right'],
    ),
    isBare: options.isBare ?? false,
    ceilingDbfs: ceilingDbfs ?? null,
  };
}
