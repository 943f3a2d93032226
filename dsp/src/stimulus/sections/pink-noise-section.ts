import { createRandom } from '../../random/create-random.js';
import { createRealFft } from '../../spectrum/create-real-fft.js';
import { invertRealFft } from '../marks/inverse-transform.js';
import { overlapOf, rampGain, type SectionRun, type Span } from './span.js';

/** Noise of equal power in every octave, made of one period that repeats. */
export interface PinkNoiseSection extends Span {
  readonly kind: 'pink-noise';
  readonly rampFrames: number;
  readonly rms: number;
  readonly seed: number;
}

const PERIOD_FRAMES = 131_072;
const LOWEST_HZ = 10;
/** Share of the rate up to which there is noise. */
const HIGHEST_SHARE = 0.47;
/** Peak over RMS, that noise of -10 dBFS stays inside the scale; some draws of phases keep to it. */
const HIGHEST_CREST = 4.3;
const DRAWS_AT_MOST = 64;

/** Renders one period of unit RMS: amplitude falls as the root of frequency, phases are random. */
function drawPeriod(sampleRateHz: number, seed: number): { period: Float64Array; crest: number } {
  const random = createRandom(seed);
  const half = PERIOD_FRAMES / 2;
  const re = new Float64Array(half + 1);
  const im = new Float64Array(half + 1);
  const binWidthHz = sampleRateHz / PERIOD_FRAMES;
  for (let k = Math.ceil(LOWEST_HZ / binWidthHz); k <= HIGHEST_SHARE * PERIOD_FRAMES; k++) {
    const phase = 2 * Math.PI * random();
    re[k] = Math.cos(phase) / Math.sqrt(k);
    im[k] = Math.sin(phase) / Math.sqrt(k);
  }
  const period = new Float64Array(PERIOD_FRAMES);
  invertRealFft(createRealFft(PERIOD_FRAMES), re, im, period);
  let square = 0;
  let peak = 0;
  for (const x of period) {
    square += x * x;
    peak = Math.max(peak, Math.abs(x));
  }
  const rms = Math.sqrt(square / PERIOD_FRAMES);
  return { period: period.map((x) => x / rms), crest: peak / rms };
}

const periods = new Map<string, Float64Array>();

/** The first of the seed's draws with a bearable crest, else the one with the least. */
function periodOf(sampleRateHz: number, seed: number): Float64Array {
  const key = `${sampleRateHz}/${seed}`;
  const known = periods.get(key);
  if (known) return known;
  let best = drawPeriod(sampleRateHz, seed);
  for (let draw = 1; draw < DRAWS_AT_MOST && best.crest > HIGHEST_CREST; draw++) {
    const next = drawPeriod(sampleRateHz, (seed + draw * 0x9e3779b9) >>> 0);
    if (next.crest < best.crest) best = next;
  }
  periods.clear(); // one is enough: a file is rendered from its beginning to its end
  periods.set(key, best.period);
  return best.period;
}

export function addPinkNoise(section: PinkNoiseSection, run: SectionRun): void {
  const { frameCount, rampFrames, rms, seed } = section;
  const period = periodOf(run.sampleRateHz, seed);
  const { first, end, frame: firstFrame } = overlapOf(section, run);
  for (let n = first, frame = firstFrame; n < end; n++, frame++) {
    run.samples[n] += rms * rampGain(frame, frameCount, rampFrames) * period[frame % PERIOD_FRAMES];
  }
}
