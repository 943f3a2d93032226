export interface LevelMeterOptions {
  /** Valid bits of integer samples: fixes the end codes. Leave it out for float samples, whose end codes are ±1. */
  readonly integerBits?: number;
}

export interface LevelReading {
  readonly count: number;
  /** DC offset, FS; 0 for no samples. */
  readonly mean: number;
  /** FS², the constant part included; 0 for no samples. */
  readonly meanSquare: number;
  /** Greatest magnitude, FS. */
  readonly samplePeak: number;
  readonly lowest: number;
  readonly highest: number;
  readonly first: number;
  readonly last: number;
  /** Samples at an end code or beyond it. */
  readonly endCodeCount: number;
  /** Runs of three or more equal end codes. */
  readonly clippedRunCount: number;
  /** Length of the longest run of equal end codes. */
  readonly longestEndCodeRun: number;
}

export interface LevelMeter {
  push(samples: Float64Array): void;
  read(): LevelReading;
}

/** Consecutive equal end codes that count as clipped. */
const CLIPPED_RUN = 3;
/** Samples summed before they join the total: keeps the rounding of a long sum small. */
const BLOCK = 4096;

/** Makes a meter of level, constant part and clipping over a stream of one channel. */
export function createLevelMeter(options: LevelMeterOptions = {}): LevelMeter {
  const highestCode = options.integerBits === undefined ? 1 : 1 - 2 ** (1 - options.integerBits);
  let count = 0;
  let sum = 0;
  let sumOfSquares = 0;
  let lowest = Infinity;
  let highest = -Infinity;
  let first = 0;
  let last = 0;
  let endCodeCount = 0;
  let clippedRunCount = 0;
  let longestEndCodeRun = 0;
  let run = 0;
  let runSide = 0;

  const followEndCode = (value: number): void => {
    const side = value >= highestCode ? 1 : value <= -1 ? -1 : 0;
    run = side !== 0 && side === runSide ? run + 1 : side === 0 ? 0 : 1;
    runSide = side;
    if (side === 0) return;
    endCodeCount++;
    if (run === CLIPPED_RUN) clippedRunCount++;
    if (run > longestEndCodeRun) longestEndCodeRun = run;
  };

  return {
    push(samples) {
      if (samples.length === 0) return;
      if (count === 0) first = samples[0];
      for (let from = 0; from < samples.length; from += BLOCK) {
        const to = Math.min(samples.length, from + BLOCK);
        let blockSum = 0;
        let blockSquares = 0;
        let blockLowest = lowest;
        let blockHighest = highest;
        for (let n = from; n < to; n++) {
          const value = samples[n];
          blockSum += value;
          blockSquares += value * value;
          if (value > blockHighest) blockHighest = value;
          if (value < blockLowest) blockLowest = value;
        }
        lowest = blockLowest;
        highest = blockHighest;
        // Most recordings never reach an end code: they are spared this second look.
        if (highest >= highestCode || lowest <= -1) {
          for (let n = from; n < to; n++) followEndCode(samples[n]);
        }
        sum += blockSum;
        sumOfSquares += blockSquares;
      }
      count += samples.length;
      last = samples[samples.length - 1];
    },
    read() {
      const isEmpty = count === 0;
      return {
        count,
        mean: isEmpty ? 0 : sum / count,
        meanSquare: isEmpty ? 0 : sumOfSquares / count,
        samplePeak: isEmpty ? 0 : Math.max(highest, -lowest),
        lowest: isEmpty ? 0 : lowest,
        highest: isEmpty ? 0 : highest,
        first,
        last,
        endCodeCount,
        clippedRunCount,
        longestEndCodeRun,
      };
    },
  };
}
