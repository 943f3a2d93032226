import type {
  BenchRecord,
  Break,
  Calibration,
  InputGrid,
  MeasureId,
  StimulusDescriptor,
} from '@benchlark/dsp';

/** What is known of the rig that is worked on; goes into the settings of every analysis, in full. */
export interface RigSettings {
  readonly calibration: Calibration | null;
  readonly baseline: BenchRecord | null;
}

/** How the live picture is made. */
export interface Look extends RigSettings {
  readonly fftLength: number;
  readonly averages: number;
  readonly bandLowHz: number;
  readonly bandHighHz: number;
  /** Steady tones that play now; in anything else jumps aren't looked for. */
  readonly tonesHz: readonly number[];
}

/** A rolling spectrum; the bins lie from 0 Hz to half the rate. */
export interface SpectrumPicture {
  readonly sampleRateHz: number;
  readonly fftLength: number;
  readonly averaged: number;
  /** One array a channel, dBFS. */
  readonly levels: readonly Float64Array<ArrayBuffer>[];
  /** What the worker needed for it, milliseconds. */
  readonly tookMs: number;
}

/** What the last moments of a steady tone, or of silence, give. Nothing of it is stored. */
export interface FiguresPicture {
  readonly record: BenchRecord;
}

/** What the input itself shows, all the while. */
export interface InputState {
  readonly frames: number;
  readonly sampleRateHz: number;
  readonly channelCount: number;
  /** Highest sample since the last state, a channel, dBFS. */
  readonly peaksDbfs: readonly number[];
  /** A channel has reached its end codes since the tone began. */
  readonly isOverloaded: boolean;
  readonly grid: InputGrid;
  /** Damaged blocks since the rig was opened. */
  readonly breakCount: number;
}

export interface LiveSink {
  readonly onSpectrum: (picture: SpectrumPicture) => void;
  readonly onFigures: (picture: FiguresPicture) => void;
  readonly onState: (state: InputState) => void;
  readonly onEnd: (why: string | null) => void;
}

/** What is recorded for, so that its bytes, its place in time and its record can be made. */
export interface TakeRequest extends RigSettings {
  readonly measure: MeasureId;
  readonly descriptor: StimulusDescriptor | null;
  readonly bandLowHz: number;
  readonly bandHighHz: number;
  readonly isPractice: boolean;
  /** ISO 8601. */
  readonly startedAt: string;
  /** Of the unit and rig, for whoever finds the file alone. */
  readonly description: string;
}

export interface TakeResult {
  readonly wav: Blob;
  readonly sha256: string;
  readonly sampleRateHz: number;
  readonly channelCount: number;
  readonly durationS: number;
  /** Frames are of this recording. */
  readonly breaks: readonly Break[];
  readonly isOverloaded: boolean;
  readonly grid: InputGrid;
  readonly settings: {
    readonly fromS?: number;
    readonly toS?: number;
    readonly bandLowHz: number;
    readonly bandHighHz: number;
  };
  /** Null where the recording could not be measured; its samples are there all the same. */
  readonly record: BenchRecord | null;
  readonly failure: string | null;
}
