export const DEVICE_SCHEMA = 'benchlark-device/1';

export type StageChannel = 'both' | 'left' | 'right';

/** `both` stands for every channel of the recording. */
interface OnChannel<Kind extends string> {
  readonly kind: Kind;
  readonly channel: StageChannel;
}

export type GainStage = OnChannel<'gain'> & { readonly gainDb: number };
/** Adds a constant, linear. */
export type OffsetStage = OnChannel<'offset'> & { readonly value: number };
/** Coefficients of x, x², x³ and so on. */
export type PolynomialStage = OnChannel<'polynomial'> & { readonly coefficients: readonly number[] };
/** Limits as linear magnitudes, each 0 or more. */
export type ClipStage = OnChannel<'clip'> & { readonly positive: number; readonly negative: number };
/** A clip whose bend begins `kneeDb` below each limit; 0 is the hard clip. */
export type SoftClipStage = OnChannel<'soft-clip'> & {
  readonly positive: number;
  readonly negative: number;
  readonly kneeDb: number;
};
/** Half of the zone, linear: what lies within ±width is lost, and the rest is that much nearer to zero. */
export type DeadZoneStage = OnChannel<'dead-zone'> & { readonly width: number };
export type FilterStage = OnChannel<'filter'> & {
  readonly type: 'low-pass' | 'high-pass' | 'shelf' | 'peak';
  /** Corner (-3 dB of a low or high pass without `q`), middle of a shelf's slope, or middle of a peak. */
  readonly frequencyHz: number;
  /** Of a low or high pass, 1 to 12; Butterworth unless `q` is given. 2 when left out. */
  readonly order?: number;
  readonly q?: number;
  /** Of a shelf or a peak. */
  readonly gainDb?: number;
  /** Which end of the band a shelf lifts; `high` when left out. */
  readonly side?: 'low' | 'high';
};
/** Leak of the other channel into the channel named, without phase. */
export type CrosstalkStage = OnChannel<'crosstalk'> & {
  /** At 1 kHz. */
  readonly levelDb: number;
  readonly slopeDbPerOctave: number;
};
/** Positive: later. The recording keeps its length. */
export type DelayStage = OnChannel<'delay'> & { readonly samples: number };
export type PolarityStage = OnChannel<'polarity'>;
/** White and Gaussian, independent from channel to channel; RMS over the whole band. */
export type NoiseStage = OnChannel<'noise'> & { readonly levelDbfs: number };
/** levelsDbfs[0] belongs to `frequencyHz`, levelsDbfs[1] to twice that, and so on. */
export type HumStage = OnChannel<'hum'> & {
  readonly frequencyHz: number;
  readonly levelsDbfs: readonly number[];
};
export type ToneStage = OnChannel<'tone'> & { readonly frequencyHz: number; readonly levelDbfs: number };
/** Either sinusoidal, by its peak-to-peak value and frequency, or white and Gaussian, by its RMS value. */
export type JitterStage = OnChannel<'jitter'> & {
  readonly peakToPeakPs?: number;
  readonly frequencyHz?: number;
  readonly rmsPs?: number;
};
/** Sample · (1 + m sin): `depthDb` = 20 lg m, so that each sideband stands 6.02 dB below `depthDb`. */
export type AmplitudeModulationStage = OnChannel<'amplitude-modulation'> & {
  readonly depthDb: number;
  readonly frequencyHz: number;
};
/** Positive: the player is fast against the recorder, and the recording gets shorter and higher. Every channel's. */
export type ClockStage = OnChannel<'clock'> & { readonly ppm: number };
export type QuantiseStage = OnChannel<'quantise'> & {
  readonly bits: number;
  readonly dither: 'tpdf' | 'none';
};
/**
 * The recorder runs `seconds` before the player starts and after it stops. The other stages run all the while, wherever
 * this one stands among them, so that their noise and hum are heard alone there. Every channel's.
 */
export type LeadStage = OnChannel<'lead'> & { readonly seconds: number };

export type PracticeStage =
  | GainStage
  | OffsetStage
  | PolynomialStage
  | ClipStage
  | SoftClipStage
  | DeadZoneStage
  | FilterStage
  | CrosstalkStage
  | DelayStage
  | PolarityStage
  | NoiseStage
  | HumStage
  | ToneStage
  | JitterStage
  | AmplitudeModulationStage
  | ClockStage
  | QuantiseStage
  | LeadStage;

export type StageKind = PracticeStage['kind'];

/** An invented piece of equipment with faults of known size, to learn on and to test against. */
export interface PracticeDevice {
  readonly schema: typeof DEVICE_SCHEMA;
  readonly name: string;
  /** The rate it works at; null for any. */
  readonly sampleRateHz: number | null;
  /** Whole number, 0 to 2^32 - 1: the same seed gives the same noise. */
  readonly seed: number;
  /** In the signal's order. */
  readonly stages: readonly PracticeStage[];
}
