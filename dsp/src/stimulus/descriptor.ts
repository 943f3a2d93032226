import type { MeasureId } from '../record/record.js';

export const STIMULUS_SCHEMA = 'benchlark-stimulus/1';

export type StimulusBits = 16 | 24 | '32f';
export type StimulusChannels = 'both' | 'left' | 'right';

export interface StimulusMark {
  readonly kind: 'start' | 'end';
  /** Where the chirp begins, seconds from the file's first frame. */
  readonly atS: number;
}

export interface StimulusStep {
  readonly levelDbfs: number;
  readonly fromS: number;
  readonly toS: number;
}

export interface StimulusPart {
  readonly measure: MeasureId;
  readonly channels: StimulusChannels;
  readonly fromS: number;
  readonly toS: number;
  readonly parameters: Readonly<Record<string, number | string>>;
  readonly steps: readonly StimulusStep[];
}

/** Stands beside a stimulus file and says what is in it. */
export interface StimulusDescriptor {
  readonly schema: typeof STIMULUS_SCHEMA;
  readonly name: string;
  readonly parameters: Readonly<Record<string, number | string>>;
  readonly sampleRateHz: number;
  readonly bitsPerSample: StimulusBits;
  readonly dither: 'tpdf' | 'none';
  readonly seed: number;
  readonly channels: StimulusChannels;
  readonly frameCount: number;
  readonly sha256: string;
  readonly marks: readonly StimulusMark[];
  readonly parts: readonly StimulusPart[];
}
