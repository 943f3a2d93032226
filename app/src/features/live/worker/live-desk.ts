import {
  analyseCapture,
  bytesFromBlob,
  createBreakDetector,
  createGridDetector,
  createLiveAnalyser,
  getMeasure,
  openMemorySource,
  openWav,
  readSelfCheck,
  SELF_CHECK_DURATION_S,
  undoAsymmetricScaling,
  type AnalysisSettings,
  type Break,
  type BreakDetector,
  type GridDetector,
  type LiveAnalyser,
  type SelfCheckResult,
} from '@benchlark/dsp';
import { longestCleanStretch } from './clean-stretch';
import type { LiveSink, Look, RigSettings, TakeRequest, TakeResult } from './live-types';
import type { InputBlock } from './read-feed';
import { Recording } from './recording';

/** 25 pictures a second leave room for 20 after what else goes on. */
const SPECTRUM_EVERY_MS = 40;
/** Figures that change faster than this can't be read. */
const FIGURES_EVERY_MS = 500;
const STATE_EVERY_MS = 200;
/** So much of a steady tone is kept at hand, to be kept for good on a key. */
const AT_HAND_S = 10;
/** A tone's measure gains little from more. */
const KEPT_TONE_S = 5;
const SHORTEST_TONE_S = 0.5;
/** A change has come through the rig by then. */
const SETTLE_S = 0.5;

const DEFAULT_LOOK: Look = {
  fftLength: 65_536,
  averages: 8,
  bandLowHz: 20,
  bandHighHz: 20_000,
  tonesHz: [],
  calibration: null,
  baseline: null,
};

/** Everything that is done with an input's samples, block by block, in the worker. */
export class LiveDesk {
  readonly #sink: LiveSink;
  readonly #fallbackRateHz: number;
  readonly #now: () => number;
  #look = DEFAULT_LOOK;
  #rateHz = 0;
  #channelCount = 0;
  #analyser: LiveAnalyser | null = null;
  #grids: GridDetector[] = [];
  #detector: BreakDetector | null = null;
  #atHand: Recording | null = null;
  #recording: { samples: Recording; fromFrame: number; breaks: Break[] } | null = null;
  #frames = 0;
  #breaks: Break[] = [];
  #peaks: number[] = [];
  #isOverloaded = false;
  #isMeasuring = false;
  #lastMs = { spectrum: 0, figures: 0, state: 0 };

  /** @param now - milliseconds, by which pictures are spaced */
  constructor(fallbackRateHz: number, sink: LiveSink, now: () => number = () => performance.now()) {
    this.#fallbackRateHz = fallbackRateHz;
    this.#sink = sink;
    this.#now = now;
  }

  setLook(look: Look): void {
    const isOther = look.fftLength !== this.#look.fftLength || look.averages !== this.#look.averages;
    const isOtherTone = look.tonesHz.join() !== this.#look.tonesHz.join();
    this.#look = look;
    if (isOther && this.#rateHz > 0) this.#analyser = this.#makeAnalyser();
    if (isOtherTone) this.noteChange();
  }

  /**
   * The signal itself changes now: averages begin anew, jumps of the next moments are its own.
   *
   * @param lastsS - how long it goes on changing; while a clipping tone rises, its corners grow
   */
  noteChange(lastsS = 0): void {
    const settleFrames = Math.round((lastsS + SETTLE_S) * this.#rateHz);
    this.#detector?.setTones(this.#look.tonesHz);
    this.#detector?.expectChange(this.#frames, this.#frames + settleFrames);
    this.#analyser?.skip();
    this.#analyser?.restart();
    this.#atHand?.clear();
    this.#isOverloaded = false;
  }

  take({ channels, sampleRateHz }: InputBlock): void {
    this.#fit(sampleRateHz ?? this.#fallbackRateHz, channels.length);
    const isBent = this.#grids[0]?.read().kind === '16-bit-asymmetric';
    channels.forEach((samples, index) => {
      this.#grids[index]?.push(samples);
      this.#peaks[index] = samples.reduce(
        (top, value) => Math.max(top, Math.abs(value)),
        this.#peaks[index] ?? 0,
      );
      if (isClipped(samples)) this.#isOverloaded = true;
      if (isBent) undoAsymmetricScaling(samples);
    });
    const broken = this.#detector?.push(channels) ?? [];
    this.#analyser?.push(channels);
    this.#atHand?.push(channels);
    this.#recording?.samples.push(channels);
    this.#frames += channels[0]?.length ?? 0;
    if (broken.length > 0) this.#reject(broken);
    this.#show();
  }

  startRecording(): void {
    this.#isOverloaded = false;
    this.#recording = {
      samples: new Recording(this.#rateHz || this.#fallbackRateHz, this.#channelCount || 2),
      fromFrame: this.#frames,
      breaks: [],
    };
  }

  dropRecording(): void {
    this.#recording = null;
  }

  /** Ends the recording and measures it. */
  async finishRecording(request: TakeRequest, onProgress: (share: number) => void): Promise<TakeResult> {
    const recording = this.#recording;
    if (!recording) throw new Error('nothing is being recorded');
    this.#recording = null;
    const breaks = recording.breaks.map((one) => ({
      ...one,
      fromFrame: one.fromFrame - recording.fromFrame,
      toFrame: one.toFrame - recording.fromFrame,
    }));
    return this.#measure(recording.samples, breaks, request, onProgress);
  }

  /** Keeps the last moments of the steady tone that plays. */
  async keepNewest(request: TakeRequest, onProgress: (share: number) => void): Promise<TakeResult> {
    const atHand = this.#atHand;
    if (!atHand || atHand.frames < SHORTEST_TONE_S * this.#rateHz) {
      throw new Error('the tone has not played long enough yet: wait a second');
    }
    const firstFrame = this.#frames - atHand.frames;
    const inside = this.#breaks
      .filter(({ toFrame }) => toFrame > firstFrame)
      .map((one) => ({
        ...one,
        fromFrame: Math.max(0, one.fromFrame - firstFrame),
        toFrame: one.toFrame - firstFrame,
      }));
    // The newest frames are taken from the end of what holds no damage.
    const last = inside.at(-1)?.toFrame ?? 0;
    const frames = Math.min(atHand.frames - last, Math.round(KEPT_TONE_S * this.#rateHz));
    if (frames < SHORTEST_TONE_S * this.#rateHz) {
      throw new Error('a damaged block has just come in: wait a second');
    }
    return this.#measure(atHand.newest(frames), [], request, onProgress);
  }

  /** Reads a self-check out of the recording that has run since it was sent. */
  finishSelfCheck(): SelfCheckResult {
    const recording = this.#recording;
    if (!recording) throw new Error('nothing is being recorded');
    this.#recording = null;
    const { samples } = recording;
    const frames = Math.round(SELF_CHECK_DURATION_S * samples.sampleRateHz * 1.5);
    return readSelfCheck(samples.toChannels(frames), samples.sampleRateHz);
  }

  #fit(rateHz: number, channelCount: number): void {
    if (rateHz === this.#rateHz && channelCount === this.#channelCount) return;
    this.#rateHz = rateHz;
    this.#channelCount = channelCount;
    this.#analyser = this.#makeAnalyser();
    this.#grids = Array.from({ length: channelCount }, () => createGridDetector());
    this.#detector = createBreakDetector({ sampleRateHz: rateHz });
    this.#detector.setTones(this.#look.tonesHz);
    this.#detector.expectChange(0, rateHz);
    this.#atHand = new Recording(rateHz, channelCount, AT_HAND_S * rateHz);
    this.#peaks = [];
  }

  #makeAnalyser(): LiveAnalyser {
    const { fftLength, averages } = this.#look;
    return createLiveAnalyser({
      sampleRateHz: this.#rateHz,
      channelCount: this.#channelCount,
      fftLength,
      averages,
    });
  }

  #reject(broken: readonly Break[]): void {
    this.#breaks.push(...broken);
    this.#recording?.breaks.push(
      ...broken.filter(({ toFrame }) => toFrame > (this.#recording?.fromFrame ?? 0)),
    );
    this.#analyser?.skip();
    // A break is told a little after its frames: spectra of meanwhile may hold it.
    this.#analyser?.restart();
  }

  #show(): void {
    const now = this.#now();
    if (now - this.#lastMs.spectrum >= SPECTRUM_EVERY_MS) {
      const levels = this.#analyser?.spectrum();
      if (levels) {
        this.#lastMs.spectrum = now;
        this.#sink.onSpectrum({
          sampleRateHz: this.#rateHz,
          fftLength: this.#look.fftLength,
          averaged: this.#analyser?.averaged ?? 0,
          levels,
          tookMs: this.#now() - now,
        });
      }
    }
    if (now - this.#lastMs.state >= STATE_EVERY_MS) {
      this.#lastMs.state = now;
      this.#sink.onState({
        frames: this.#frames,
        sampleRateHz: this.#rateHz,
        channelCount: this.#channelCount,
        peaksDbfs: this.#peaks.map((peak) => 20 * Math.log10(Math.max(peak, 1e-10))),
        isOverloaded: this.#isOverloaded,
        grid: this.#grids[0]?.read() ?? createGridDetector().read(),
        breakCount: this.#breaks.length,
      });
      this.#peaks = [];
    }
    if (now - this.#lastMs.figures >= FIGURES_EVERY_MS && !this.#isMeasuring && !this.#recording) {
      void this.#measureNow();
    }
  }

  /** The stored measure on the newest frames: the same code, on less. */
  async #measureNow(): Promise<void> {
    const { fftLength, bandLowHz, bandHighHz, tonesHz, calibration, baseline } = this.#look;
    const channels = this.#analyser?.newest(Math.max(fftLength, 32_768)) ?? [];
    if ((channels[0]?.length ?? 0) < Math.min(fftLength, SHORTEST_TONE_S * this.#rateHz)) return;
    this.#isMeasuring = true;
    try {
      const source = openMemorySource(channels, this.#rateHz);
      const record = await getMeasure(
        tonesHz.length === 0 ? 'idle' : tonesHz.length === 2 ? 'two-tone' : 'tone',
      ).analyse(
        source,
        {
          bandLowHz,
          bandHighHz: Math.min(bandHighHz, this.#rateHz / 2),
          ...knownOf({ calibration, baseline }),
        },
        {
          capture: {
            sha256: '',
            sampleRateHz: this.#rateHz,
            channelCount: channels.length,
            bitsPerSample: 32,
            sampleFormat: 'float',
            frameCount: source.frameCount,
            durationS: source.frameCount / this.#rateHz,
          },
        },
      );
      this.#sink.onFigures({ record });
    } finally {
      this.#isMeasuring = false;
      this.#lastMs.figures = this.#now();
    }
  }

  async #measure(
    samples: Recording,
    breaks: readonly Break[],
    request: TakeRequest,
    onProgress: (share: number) => void,
  ): Promise<TakeResult> {
    const { wav, sha256 } = samples.toWav(request);
    const file = await openWav(bytesFromBlob(wav));
    const settings = {
      ...(STEADY.has(request.measure) && breaks.length > 0 ? cleanPart(samples, breaks) : {}),
      bandLowHz: request.bandLowHz,
      bandHighHz: Math.min(request.bandHighHz, samples.sampleRateHz / 2),
    };
    const { descriptor } = request;
    const { record, failure } = await analyseCapture(
      file,
      sha256,
      {
        measure: request.measure,
        settings: { ...settings, ...knownOf(request), ...(descriptor ? { descriptor } : {}) },
      },
      { onProgress },
    ).then(
      (analysis) => ({ record: analysis.record, failure: null }),
      // What was recorded is worth keeping all the same.
      (reason: unknown) => ({
        record: null,
        failure: reason instanceof Error ? reason.message : String(reason),
      }),
    );
    return {
      wav,
      sha256,
      sampleRateHz: samples.sampleRateHz,
      channelCount: samples.channelCount,
      durationS: samples.frames / samples.sampleRateHz,
      breaks,
      isOverloaded: this.#isOverloaded,
      grid: this.#grids[0]?.read() ?? createGridDetector().read(),
      settings,
      record,
      failure,
    };
  }
}

const END_CODE = 1 - 2 ** -15;

/** Three equal samples in a row at the end of the scale: a wave is nowhere so flat by itself. */
function isClipped(samples: Float32Array): boolean {
  for (let n = 2; n < samples.length; n += 1) {
    const value = samples[n] ?? 0;
    if (Math.abs(value) >= END_CODE && value === samples[n - 1] && value === samples[n - 2]) return true;
  }
  return false;
}

/** Left out where there is none, as the server leaves it out. */
function knownOf({ calibration, baseline }: RigSettings): Pick<AnalysisSettings, 'calibration' | 'baseline'> {
  return { ...(calibration ? { calibration } : {}), ...(baseline ? { baseline } : {}) };
}

/** Measures that any stretch of a steady signal serves as well as the whole. */
const STEADY: ReadonlySet<string> = new Set(['tone', 'two-tone', 'idle', 'jitter']);

function cleanPart(samples: Recording, breaks: readonly Break[]): { fromS: number; toS: number } {
  const { fromFrame, toFrame } = longestCleanStretch(samples.frames, breaks);
  return { fromS: fromFrame / samples.sampleRateHz, toS: toFrame / samples.sampleRateHz };
}
