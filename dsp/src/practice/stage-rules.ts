import type { StageKind } from './device.js';

/** What a key of a stage may hold. */
export type KeyRule =
  | { readonly is: 'number'; readonly low: number; readonly high: number; readonly isWhole?: true }
  | { readonly is: 'numbers'; readonly low: number; readonly high: number }
  | { readonly is: 'choice'; readonly of: readonly string[] };

export interface StageRule {
  readonly needs: Readonly<Record<string, KeyRule>>;
  readonly allows?: Readonly<Record<string, KeyRule>>;
  /** One clock drives every channel: the stage can't be one channel's. */
  readonly isCommon?: true;
}

function between(low: number, high: number): KeyRule {
  return { is: 'number', low, high };
}

const LEVEL = between(-300, 20);
const GAIN = between(-300, 120);
const FREQUENCY = between(1e-3, 1e6);
const LIMIT = between(0, 1000);

/** The keys of every kind of stage. */
export const STAGE_RULES: Readonly<Record<StageKind, StageRule>> = {
  gain: { needs: { gainDb: GAIN } },
  offset: { needs: { value: between(-10, 10) } },
  polynomial: { needs: { coefficients: { is: 'numbers', low: -1e6, high: 1e6 } } },
  clip: { needs: { positive: LIMIT, negative: LIMIT } },
  'soft-clip': { needs: { positive: LIMIT, negative: LIMIT, kneeDb: between(0, 60) } },
  'dead-zone': { needs: { width: LIMIT } },
  filter: {
    needs: { type: { is: 'choice', of: ['low-pass', 'high-pass', 'shelf', 'peak'] }, frequencyHz: FREQUENCY },
    allows: {
      order: { is: 'number', low: 1, high: 12, isWhole: true },
      q: between(0.01, 1000),
      gainDb: between(-120, 120),
      side: { is: 'choice', of: ['low', 'high'] },
    },
  },
  crosstalk: { needs: { levelDb: GAIN, slopeDbPerOctave: between(-12, 12) } },
  delay: { needs: { samples: between(-1e7, 1e7) } },
  polarity: { needs: {} },
  noise: { needs: { levelDbfs: LEVEL } },
  hum: { needs: { frequencyHz: FREQUENCY, levelsDbfs: { is: 'numbers', low: -300, high: 20 } } },
  tone: { needs: { frequencyHz: FREQUENCY, levelDbfs: LEVEL } },
  jitter: {
    needs: {},
    allows: { peakToPeakPs: between(0, 1e9), frequencyHz: FREQUENCY, rmsPs: between(0, 1e9) },
  },
  'amplitude-modulation': { needs: { depthDb: between(-300, 0), frequencyHz: FREQUENCY } },
  clock: { needs: { ppm: between(-10_000, 10_000) }, isCommon: true },
  quantise: {
    needs: {
      bits: { is: 'number', low: 1, high: 32, isWhole: true },
      dither: { is: 'choice', of: ['tpdf', 'none'] },
    },
  },
  lead: { needs: { seconds: between(0, 600) }, isCommon: true },
};
