import type { MeasureId } from '../record/record.js';

/** What a stimulus is when nothing else is asked for. */
export interface StimulusKind {
  readonly name: string;
  /** The measure its body is made for. */
  readonly measure: MeasureId;
  readonly tone: { readonly frequencyHz: number; readonly levelDbfs: number } | null;
  readonly durationS: number;
  /** Nothing but zeros: no lead-in, no marks, no dither. */
  readonly isDigitalZero: boolean;
  /** Its figures rest on the level in the file, so that the marks may name it at the default level alone. */
  readonly isLevelNamed: boolean;
}

export const STIMULUS_KINDS: readonly StimulusKind[] = [
  {
    name: 'sine',
    measure: 'tone',
    tone: { frequencyHz: 997, levelDbfs: -1 },
    durationS: 10,
    isDigitalZero: false,
    isLevelNamed: false,
  },
  {
    name: 'low-level-tone',
    measure: 'dynamic-range',
    tone: { frequencyHz: 997, levelDbfs: -60 },
    durationS: 10,
    isDigitalZero: false,
    isLevelNamed: true,
  },
  {
    name: 'silence',
    measure: 'idle',
    tone: null,
    durationS: 10,
    isDigitalZero: true,
    isLevelNamed: false,
  },
];

/** The stimuli that can be made. */
export const STIMULUS_NAMES: readonly string[] = STIMULUS_KINDS.map(({ name }) => name);
