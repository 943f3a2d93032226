import type { MeasureId } from '../record/record.js';
import type { LayOutBody } from './bodies/body.js';
import { layOutIntersampleTone } from './bodies/intersample-body.js';
import { layOutJitterTest } from './bodies/jitter-body.js';
import { layOutLevelSteps } from './bodies/level-steps-body.js';
import { layOutMultitone } from './bodies/multitone-body.js';
import { layOutPinkNoise, layOutWhiteNoise } from './bodies/noise-body.js';
import { layOutTwoTone, layOutTwoToneSteps } from './bodies/pair-body.js';
import { layOutProgramme } from './bodies/programme-body.js';
import { layOutSilence } from './bodies/silence-body.js';
import { layOutSquare } from './bodies/square-body.js';
import { layOutSeparation, layOutSweep } from './bodies/sweep-body.js';
import { layOutTone } from './bodies/tone-body.js';
import { DIFFERENCE_TONES_HZ, MODULATION_TONES_HZ, TONE_HZ } from './bodies/usual-tones.js';

/** What a person may set of a stimulus beyond its file's form, and what it is unless set. */
export interface StimulusDefaults {
  readonly frequencyHz?: number;
  readonly lowFrequencyHz?: number;
  readonly highFrequencyHz?: number;
  readonly levelDbfs?: number;
  readonly durationS?: number;
  /** There is a short form too. */
  readonly isQuick?: boolean;
}

/** What a stimulus is when nothing else is asked for. */
export interface StimulusKind {
  readonly name: string;
  /** The measure its body is made for. */
  readonly measure: MeasureId;
  /** A key that is missing can't be set. */
  readonly defaults: StimulusDefaults;
  /** The highest top level, dBFS. */
  readonly highestLevelDbfs: number;
  /** Nothing but zeros: no lead-in, no marks, no dither. */
  readonly isDigitalZero: boolean;
  /** Its figures rest on the level in the file, so that the marks may name it at the default level alone. */
  readonly isLevelNamed: boolean;
  /** What it holds depends on the file's rate, so that the marks name the rate too. */
  readonly isRateNamed: boolean;
  /** Dithered unless asked for otherwise. */
  readonly isDithered: boolean;
  /** Each channel's turn comes in the file: it can't be kept to one channel. */
  readonly isBothOnly: boolean;
  readonly layOut: LayOutBody;
}

const USUAL = {
  highestLevelDbfs: 0,
  isDigitalZero: false,
  isLevelNamed: false,
  isRateNamed: false,
  isDithered: true,
  isBothOnly: false,
} as const;

/** Uniform noise of a higher RMS would leave the scale: its peak lies 1.76 dB above a sine's of the same RMS. */
const HIGHEST_NOISE_DBFS = -6;

export const STIMULUS_KINDS: readonly StimulusKind[] = [
  {
    ...USUAL,
    name: 'sine',
    measure: 'tone',
    defaults: { frequencyHz: TONE_HZ, levelDbfs: -1, durationS: 10 },
    layOut: layOutTone('tone'),
  },
  {
    ...USUAL,
    name: 'low-level-tone',
    measure: 'dynamic-range',
    defaults: { frequencyHz: TONE_HZ, levelDbfs: -60, durationS: 10 },
    isLevelNamed: true,
    layOut: layOutTone('dynamic-range'),
  },
  {
    ...USUAL,
    name: 'silence',
    measure: 'idle',
    defaults: { durationS: 10 },
    isDigitalZero: true,
    isDithered: false,
    layOut: layOutSilence,
  },
  {
    ...USUAL,
    name: 'level-steps',
    measure: 'level-steps',
    defaults: { frequencyHz: TONE_HZ, levelDbfs: 0 },
    isLevelNamed: true,
    layOut: layOutLevelSteps,
  },
  {
    ...USUAL,
    name: 'sweep',
    measure: 'sweep',
    defaults: { levelDbfs: -10, durationS: 8 },
    isRateNamed: true,
    layOut: layOutSweep,
  },
  {
    ...USUAL,
    name: 'modulation-pair',
    measure: 'two-tone',
    defaults: { ...MODULATION_TONES_HZ, levelDbfs: -1, durationS: 5 },
    layOut: layOutTwoTone(4),
  },
  {
    ...USUAL,
    name: 'difference-pair',
    measure: 'two-tone',
    defaults: { ...DIFFERENCE_TONES_HZ, levelDbfs: -1, durationS: 5 },
    layOut: layOutTwoTone(1),
  },
  {
    ...USUAL,
    name: 'modulation-steps',
    measure: 'two-tone-steps',
    defaults: { ...MODULATION_TONES_HZ, levelDbfs: 0 },
    isLevelNamed: true,
    layOut: layOutTwoToneSteps(4),
  },
  {
    ...USUAL,
    name: 'difference-steps',
    measure: 'two-tone-steps',
    defaults: { ...DIFFERENCE_TONES_HZ, levelDbfs: 0 },
    isLevelNamed: true,
    layOut: layOutTwoToneSteps(1),
  },
  {
    ...USUAL,
    name: 'multitone',
    measure: 'multitone',
    defaults: { levelDbfs: -1, durationS: 8 },
    isRateNamed: true,
    layOut: layOutMultitone,
  },
  {
    ...USUAL,
    name: 'separation',
    measure: 'separation',
    defaults: { levelDbfs: -10, durationS: 8 },
    isRateNamed: true,
    isBothOnly: true,
    layOut: layOutSeparation,
  },
  {
    ...USUAL,
    name: 'jitter-test',
    measure: 'jitter',
    defaults: { durationS: 10 },
    isRateNamed: true,
    isDithered: false,
    layOut: layOutJitterTest,
  },
  {
    ...USUAL,
    name: 'intersample-tone',
    measure: 'intersample',
    defaults: { levelDbfs: 0, durationS: 6 },
    isLevelNamed: true,
    isRateNamed: true,
    layOut: layOutIntersampleTone,
  },
  {
    ...USUAL,
    name: 'white-noise',
    measure: 'filter',
    defaults: { levelDbfs: -10, durationS: 10 },
    highestLevelDbfs: HIGHEST_NOISE_DBFS,
    isRateNamed: true,
    layOut: layOutWhiteNoise,
  },
  {
    ...USUAL,
    name: 'pink-noise',
    measure: 'loudness',
    defaults: { levelDbfs: -10, durationS: 10 },
    highestLevelDbfs: -10,
    layOut: layOutPinkNoise,
  },
  {
    ...USUAL,
    name: 'square',
    measure: 'tone',
    defaults: { frequencyHz: TONE_HZ, levelDbfs: -10, durationS: 10 },
    highestLevelDbfs: -2,
    layOut: layOutSquare,
  },
  {
    ...USUAL,
    name: 'programme',
    measure: 'programme',
    defaults: { levelDbfs: 0, isQuick: false },
    isLevelNamed: true,
    isRateNamed: true,
    isBothOnly: true,
    layOut: layOutProgramme,
  },
];

/** The stimuli that can be made. */
export const STIMULUS_NAMES: readonly string[] = STIMULUS_KINDS.map(({ name }) => name);

export function findStimulusKind(name: string | null): StimulusKind | null {
  return STIMULUS_KINDS.find((kind) => kind.name === name) ?? null;
}
