/** A steady tone as it is asked for. */
export interface SteadyTone {
  readonly frequencyHz: number;
  /** Linear peak, 0 to 1. */
  readonly peak: number;
}

export type ToneChannels = 'both' | 'left' | 'right';

export interface ToneRequest {
  readonly tones: readonly SteadyTone[];
  readonly channels: ToneChannels;
  /** Seconds until the peak asked for is reached; a longer one rises evenly in decibels from `riseFromPeak`. */
  readonly rampS: number;
  readonly riseFromPeak: number;
}

/** No step of gain is taken quicker than this: a jump would click. */
const SHORTEST_RAMP_S = 0.02;

interface Voice {
  readonly frequencyHz: number;
  /** Of the turn, 0 to 1. */
  turn: number;
  gain: number;
  target: number;
  /** Added (fading to or from silence) or multiplied (between two levels) sample by sample. */
  step: number;
  factor: number;
  framesLeft: number;
}

/** Sums steady tones block by block; levels change by ramps, and a frequency that is given up fades out. */
export class ToneSource {
  readonly #sampleRateHz: number;
  #voices: Voice[] = [];
  #channels: ToneChannels = 'both';

  constructor(sampleRateHz: number) {
    this.#sampleRateHz = sampleRateHz;
  }

  /** True as long as anything sounds. */
  get isSounding(): boolean {
    return this.#voices.length > 0;
  }

  set({ tones, channels, rampS, riseFromPeak }: ToneRequest): void {
    this.#channels = channels;
    const kept = this.#voices.map(({ frequencyHz }) => frequencyHz);
    for (const voice of this.#voices) {
      const wanted = tones.find(({ frequencyHz }) => frequencyHz === voice.frequencyHz);
      this.#ramp(voice, wanted?.peak ?? 0, wanted ? rampS : SHORTEST_RAMP_S);
    }
    for (const { frequencyHz, peak } of tones) {
      if (kept.includes(frequencyHz)) continue;
      const voice: Voice = { frequencyHz, turn: 0, gain: 0, target: 0, step: 0, factor: 1, framesLeft: 0 };
      // A rise in decibels needs somewhere to begin.
      if (rampS > SHORTEST_RAMP_S) voice.gain = Math.min(peak, riseFromPeak);
      this.#ramp(voice, peak, rampS);
      this.#voices.push(voice);
    }
  }

  /** Fades everything out. */
  stop(): void {
    for (const voice of this.#voices) this.#ramp(voice, 0, SHORTEST_RAMP_S);
  }

  /** @param left - overwritten; @param right - overwritten; null on a mono output */
  fill(left: Float32Array, right: Float32Array | null): void {
    left.fill(0);
    for (const voice of this.#voices) this.#add(voice, left);
    if (right) {
      right.set(left);
      if (this.#channels === 'left') right.fill(0);
    }
    if (this.#channels === 'right') left.fill(0);
    this.#voices = this.#voices.filter(({ gain, framesLeft }) => gain > 0 || framesLeft > 0);
  }

  #ramp(voice: Voice, target: number, seconds: number): void {
    const frames = Math.max(1, Math.round(Math.max(SHORTEST_RAMP_S, seconds) * this.#sampleRateHz));
    voice.target = target;
    voice.framesLeft = frames;
    const isBetweenLevels = voice.gain > 0 && target > 0;
    voice.factor = isBetweenLevels ? (target / voice.gain) ** (1 / frames) : 1;
    voice.step = isBetweenLevels ? 0 : (target - voice.gain) / frames;
  }

  #add(voice: Voice, out: Float32Array): void {
    const turnsPerFrame = voice.frequencyHz / this.#sampleRateHz;
    for (let n = 0; n < out.length; n += 1) {
      out[n] = (out[n] ?? 0) + voice.gain * Math.sin(2 * Math.PI * voice.turn);
      voice.turn += turnsPerFrame;
      if (voice.turn >= 1) voice.turn -= 1;
      if (voice.framesLeft > 0) {
        voice.framesLeft -= 1;
        voice.gain = voice.framesLeft === 0 ? voice.target : voice.gain * voice.factor + voice.step;
      }
    }
  }
}
