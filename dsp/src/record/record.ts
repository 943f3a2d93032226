import type { CaptureFacts } from '../source/sample-source.js';
import type { StimulusDescriptor } from '../stimulus/descriptor.js';
import type { WarningCode } from './warning.js';

export const RECORD_SCHEMA = 'benchlark-record/1';

export const MEASURE_IDS = [
  'tone',
  'idle',
  'dynamic-range',
  'two-tone',
  'two-tone-steps',
  'level-steps',
  'sweep',
  'multitone',
  'separation',
  'jitter',
  'intersample',
  'filter',
  'loudness',
  'programme',
] as const;
export type MeasureId = (typeof MEASURE_IDS)[number];

/** A curve; x and y have equal length. Values are finite. */
export interface Trace {
  readonly xUnit: string;
  readonly yUnit: string;
  readonly x: ArrayLike<number>;
  readonly y: ArrayLike<number>;
}

export type FigureValue = number | string | null;
export type Figures = Readonly<Record<string, FigureValue>>;

export type LimitedBy = 'rig' | 'noise' | 'quantisation' | 'length' | 'overload';

/** What keeps a figure from being the unit's own; margin = figure less the floor at the same rate, range and level. */
export interface FigureLimit {
  readonly by: LimitedBy;
  readonly floor: number | null;
  readonly marginDb: number | null;
  /** Least and greatest value the unit alone may have, where the rig has a part in the figure. */
  readonly low: number | null;
  readonly high: number | null;
  /** Set when the figure is only bounded (the figure itself is then null). */
  readonly below: number | null;
}

/** Standard and expanded uncertainty in the figure's own unit (JCGM 100:2008, GUM). */
export interface FigureUncertainty {
  readonly standard: number;
  readonly coverageFactor: 2;
  readonly expanded: number;
  readonly components: readonly { readonly name: string; readonly value: number }[];
}

export interface Harmonic {
  readonly order: number;
  readonly frequencyHz: number;
  /** Against the fundamental; null where it stands in the noise. */
  readonly levelDbr: number | null;
  /** φn - n·φ1 with the fundamental at sine phase 0, in (-180, 180]. */
  readonly phaseDeg: number | null;
}

/** A line that isn't a harmonic: a spur, a product, a sideband pair. Its keys depend on the measure. */
export type Component = Readonly<Record<string, number | string | null>>;

export interface ChannelResult {
  readonly channel: string;
  readonly figures: Figures;
  readonly limits: Readonly<Record<string, FigureLimit>>;
  readonly uncertainty: Readonly<Record<string, FigureUncertainty>>;
  readonly harmonics: readonly Harmonic[];
  readonly components: readonly Component[];
  readonly traces: Readonly<Record<string, Trace>>;
}

export interface Warning {
  readonly code: WarningCode;
  readonly channel: string | null;
  readonly figures: readonly string[];
  /** A sentence for people: what is the matter and what to do. */
  readonly message: string;
}

export interface Finding {
  readonly code: string;
  readonly severity: 'note' | 'caution' | 'fault';
  readonly channel: string | null;
  readonly half: 'positive' | 'negative' | null;
  readonly fromStimulusDbfs: number | null;
  readonly summary: string;
  readonly evidence: readonly { readonly figure: string; readonly value: number; readonly unit: string }[];
  readonly confirmBy: string;
}

/** Volts per channel at digital full scale, embedded in the settings in full. */
export interface Calibration {
  readonly schema: 'benchlark-calibration/1';
  readonly date: string;
  /** The rate it holds for; at another one it is not applied. Left out: any. */
  readonly sampleRateHz?: number;
  /** The recorder's range or gain setting it holds for, in words. */
  readonly inputRange?: string;
  readonly channels: readonly {
    readonly channel: string;
    /** V RMS of a sine that reads 0 dBFS. */
    readonly fullScaleVrms: number;
    /** Expanded uncertainty of it, percent, k = 2. */
    readonly expandedPercent: number;
  }[];
}

export interface RecordSettings {
  readonly fromS: number;
  readonly toS: number;
  readonly window: string;
  readonly fftLength: number;
  /** Frames averaged into the spectrum. */
  readonly averages?: number;
  readonly bandLowHz: number;
  readonly bandHighHz: number;
  readonly highestHarmonic: number;
  /** Which channels were asked for; verifying a record asks for the same. */
  readonly channel?: 'left' | 'right' | 'all';
  /** Of an embedded baseline: the recorder's range or gain setting it was taken in, in words. */
  readonly inputRange?: string;
  /** The stimulus's descriptor in full, where one was given. */
  readonly descriptor?: StimulusDescriptor | null;
  readonly calibration: Calibration | null;
  /** The record of the rig without a unit, embedded without its traces. */
  readonly baseline: BenchRecord | null;
}

export interface StimulusMatch {
  readonly name: string;
  readonly recognisedBy: 'marks' | 'descriptor' | 'signal';
  readonly delayS: number | null;
  readonly clockOffsetPpm: number | null;
  readonly polarity: 'same' | 'inverted' | null;
}

export interface Between {
  readonly figures: Figures;
  readonly traces: Readonly<Record<string, Trace>>;
}

/** The part of a record that a programme's segments have as well. */
export interface RecordBody {
  readonly measure: MeasureId;
  readonly settings: RecordSettings;
  readonly reference: { readonly unitFullScaleDbfs: number | null; readonly from: string | null };
  readonly stimulus: StimulusMatch | null;
  readonly channels: readonly ChannelResult[];
  readonly between: Between;
  readonly findings: readonly Finding[];
  readonly warnings: readonly Warning[];
  readonly segments: readonly RecordBody[];
}

/** One analysis of one capture: a pure function of its bytes and the settings. */
export interface BenchRecord extends RecordBody {
  readonly schema: typeof RECORD_SCHEMA;
  readonly dspVersion: string;
  readonly capture: CaptureFacts;
}
