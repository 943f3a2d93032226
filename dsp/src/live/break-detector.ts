/** A stretch of a recording that its own content shows to be damaged; frames of the stream. */
export interface Break {
  readonly kind: 'zeroed' | 'repeated' | 'jump';
  readonly fromFrame: number;
  /** One past the last damaged frame. */
  readonly toFrame: number;
}

export interface BreakDetector {
  /**
   * Takes the next frames.
   *
   * @param channels - one array a channel, all of one length
   * @returns breaks that have become certain, in their order; one may be told a little after its frames
   */
  push(channels: readonly ArrayLike<number>[]): Break[];
  /** What was seen and not yet told. */
  end(): Break[];
  /** Says that the signal itself will change (a tone begins, its level steps): jumps in there are its own. */
  expectChange(fromFrame: number, toFrame: number): void;
  /** The steady tones that play, at most four; none where the signal is another: jumps are looked for only in tones. */
  setTones(frequenciesHz: readonly number[]): void;
}

/** Zeros in a row that no signal has by itself, in all channels. */
const ZERO_RUN = 32;
/** Lengths of a browser's blocks: a repeat is one of them, frame by frame. */
const REPEAT_FRAMES = [128, 256, 512, 1024, 2048] as const;
const HISTORY_FRAMES = 4096;
/** A residual so many times its usual size is a break; clipping's corners stay below by being usual. */
const JUMP_TIMES = 12;
/** Size of the residual's usual range is read over so many frames. */
const USUAL_FRAMES = 2048;
/** Breaks nearer than this are one. */
const JOIN_FRAMES = 64;
/** A block with fewer different values in it may repeat by chance. */
const BUSY_VALUES = 24;
const MOST_TONES = 4;
/** Least residual that counts, linear: below it arithmetic alone jumps. */
const LEAST_JUMP = 2e-6;

/**
 * Finds damaged blocks by their content: neither a context's frame count nor its statistics show them.
 *
 * Zeroed blocks by runs of exact zeros, repeated ones by equality with the frames before, dropped ones by the three-term
 * recurrence x[n] - 2 cos(ω) x[n-1] + x[n-2] (one after the other for several tones), which is zero for steady tones of ω
 * and spikes where their phase jumps.
 */
export function createBreakDetector({ sampleRateHz }: { sampleRateHz: number }): BreakDetector {
  return new Detector(sampleRateHz);
}

class Detector implements BreakDetector {
  readonly #sampleRateHz: number;
  /** Of the recurrence, newest frame first; empty without tones. */
  #taps: readonly number[] = [];
  #frame = 0;
  #history: Float64Array[] = [];
  #zeroRun = 0;
  #isSounding = false;
  readonly #usual = new Float64Array(USUAL_FRAMES);
  #usualCount = 0;
  #limit = Infinity;
  #expected: { fromFrame: number; toFrame: number }[] = [];
  #last: { kind: Break['kind']; fromFrame: number; toFrame: number } | null = null;
  #quietUntil = 0;

  constructor(sampleRateHz: number) {
    this.#sampleRateHz = sampleRateHz;
  }

  setTones(frequenciesHz: readonly number[]): void {
    const sections = frequenciesHz
      .slice(0, MOST_TONES)
      .map((hz) => [1, -2 * Math.cos((2 * Math.PI * hz) / this.#sampleRateHz), 1]);
    this.#taps = sections.length === 0 ? [] : sections.reduce(multiply, [1]);
    this.#forgetUsual();
  }

  expectChange(fromFrame: number, toFrame: number): void {
    this.#expected = [...this.#expected.filter((span) => span.toFrame > this.#frame), { fromFrame, toFrame }];
  }

  push(channels: readonly ArrayLike<number>[]): Break[] {
    const count = channels[0]?.length ?? 0;
    if (this.#history.length !== channels.length) {
      this.#history = channels.map(() => new Float64Array(HISTORY_FRAMES));
    }
    const found: Break[] = [];
    for (let n = 0; n < count; n++) {
      this.#take(channels, n, found);
      this.#frame += 1;
    }
    // Told once no more can join it.
    if (this.#last !== null && this.#frame - this.#last.toFrame > JOIN_FRAMES + HISTORY_FRAMES / 2) {
      found.push(this.#last);
      this.#last = null;
    }
    return found;
  }

  end(): Break[] {
    const found = this.#last === null ? [] : [this.#last];
    this.#last = null;
    return found;
  }

  #take(channels: readonly ArrayLike<number>[], n: number, found: Break[]): void {
    const at = this.#frame % HISTORY_FRAMES;
    let isZero = true;
    for (let c = 0; c < channels.length; c++) {
      const value = channels[c][n];
      this.#history[c][at] = value;
      if (value !== 0) isZero = false;
    }
    if (isZero) this.#zeroRun += 1;
    else {
      if (this.#zeroRun >= ZERO_RUN && this.#isSounding) {
        this.#note('zeroed', this.#frame - this.#zeroRun, this.#frame, found);
      }
      this.#zeroRun = 0;
      this.#isSounding = true;
    }
    // A stream that stays silent has stopped sounding; it was no break.
    if (this.#zeroRun > this.#sampleRateHz) this.#isSounding = false;
    if (this.#zeroRun >= ZERO_RUN) this.#quietUntil = this.#frame + this.#taps.length + 1;
    this.#lookForRepeat(found);
    this.#lookForJump(found);
  }

  #valueAt(channel: number, back: number): number {
    return this.#history[channel][(this.#frame - back + 2 * HISTORY_FRAMES) % HISTORY_FRAMES];
  }

  #lookForRepeat(found: Break[]): void {
    if (this.#zeroRun > 0) return;
    for (const length of REPEAT_FRAMES) {
      if (this.#frame >= 2 * length && this.#repeats(length)) {
        const to = this.#frame + 1;
        this.#note('repeated', to - length, to, found);
        return;
      }
    }
  }

  #repeats(length: number): boolean {
    for (let back = 0; back < length; back++) {
      for (let c = 0; c < this.#history.length; c++) {
        if (this.#valueAt(c, back) !== this.#valueAt(c, back + length)) return false;
      }
    }
    // What hardly moves repeats by chance; a tone whose period divides the block by nature: its recurrence holds there.
    if (!this.#isBusy(length)) return false;
    return (
      this.#taps.length === 0 ||
      Math.max(this.#residual(length - 1), this.#residual(length - 2)) > this.#limit
    );
  }

  #isBusy(length: number): boolean {
    const values = new Set<number>();
    for (let back = 0; back < length; back++) values.add(this.#valueAt(0, back));
    return values.size >= BUSY_VALUES;
  }

  /** The greatest residual over the channels, the newest of its frames `back` frames ago. */
  #residual(back: number): number {
    let most = 0;
    for (let c = 0; c < this.#history.length; c++) {
      let r = 0;
      for (let k = 0; k < this.#taps.length; k++) r += this.#taps[k] * this.#valueAt(c, back + k);
      most = Math.max(most, Math.abs(r));
    }
    return most;
  }

  #lookForJump(found: Break[]): void {
    if (this.#taps.length === 0 || this.#frame < this.#taps.length) return;
    const r = this.#residual(0);
    const isExpected = this.#expected.some(
      ({ fromFrame, toFrame }) => this.#frame >= fromFrame && this.#frame < toFrame,
    );
    if (isExpected) {
      this.#forgetUsual();
      return;
    }
    if (r > this.#limit && this.#frame > this.#quietUntil) {
      this.#note('jump', this.#frame - this.#taps.length + 1, this.#frame + 1, found);
      return;
    }
    this.#usual[this.#usualCount % USUAL_FRAMES] = r;
    this.#usualCount += 1;
    if (this.#usualCount % USUAL_FRAMES === 0) {
      const sorted = this.#usual.slice().sort();
      const usual = sorted[Math.floor(0.999 * USUAL_FRAMES)];
      this.#limit = Math.max(LEAST_JUMP, JUMP_TIMES * usual);
    }
  }

  #forgetUsual(): void {
    this.#usualCount = 0;
    this.#limit = Infinity;
  }

  #note(kind: Break['kind'], fromFrame: number, toFrame: number, found: Break[]): void {
    const last = this.#last;
    if (last !== null && fromFrame - last.toFrame <= JOIN_FRAMES) {
      // A repeated or zeroed block also jumps at its ends: the block says more.
      const isStronger = last.kind === 'jump' && kind !== 'jump';
      this.#last = {
        kind: isStronger ? kind : last.kind,
        fromFrame: Math.min(last.fromFrame, fromFrame),
        toFrame: Math.max(last.toFrame, toFrame),
      };
      return;
    }
    if (last !== null) found.push(last);
    this.#last = { kind, fromFrame, toFrame };
  }
}

function multiply(one: readonly number[], other: readonly number[]): number[] {
  const product = new Array<number>(one.length + other.length - 1).fill(0);
  one.forEach((a, i) => other.forEach((b, k) => (product[i + k] += a * b)));
  return product;
}
