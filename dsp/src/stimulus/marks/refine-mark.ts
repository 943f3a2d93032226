import { MARK_DURATION_S, MARK_HIGH_HZ, MARK_LOW_HZ, markAt, quadratureMarkAt } from '../mark-chirp.js';

/** A run of one channel at its full rate. */
export interface ChannelRun {
  readonly samples: Float64Array;
  /** Seconds from the recording's first frame to the run's. */
  readonly fromS: number;
  readonly sampleRateHz: number;
}

export interface RefinedMark {
  /** Seconds from the recording's first frame to the mark's beginning. */
  readonly atS: number;
  /** Peak, linear; below 0 when the polarity is inverted. */
  readonly amplitude: number;
  /** Standard deviation of `atS` that the noise beside the mark leads one to expect. */
  readonly deviationS: number;
}

/** Less than half a cycle of the middle frequency to either side; the correlation has one maximum of each sign there. */
const SEARCH_S = 150e-6;
const SEARCH_STEP_S = 10e-6;
const FINE_STEPS_S = [8e-6, 3e-6, 1e-6] as const;
const QUARTERS = 4;
/** How far the quarters of a mark may differ; noise that happens to look like a mark as a whole differs by more. */
const LEAST_COHERENCE = 0.85;
const LEAST_QUARTER = 0.3;
/** RMS angular frequency of a linear chirp. */
const RMS_RAD_PER_S =
  2 * Math.PI * Math.sqrt((MARK_LOW_HZ ** 2 + MARK_LOW_HZ * MARK_HIGH_HZ + MARK_HIGH_HZ ** 2) / 3);

type Wave = (atS: number) => number;

/** Sums samples times a wave that begins at `atS` and runs `speed` times as fast as nominal, over a share of its length. */
function project(
  run: ChannelRun,
  wave: Wave,
  atS: number,
  speed: number,
  fromShare = 0,
  toShare = 1,
): number {
  const { samples, fromS, sampleRateHz } = run;
  const lengthS = MARK_DURATION_S / speed;
  const first = Math.max(0, Math.ceil((atS + fromShare * lengthS - fromS) * sampleRateHz));
  const end = Math.min(samples.length, Math.ceil((atS + toShare * lengthS - fromS) * sampleRateHz));
  let sum = 0;
  for (let n = first; n < end; n++) sum += samples[n] * wave((n / sampleRateHz + fromS - atS) * speed);
  return sum;
}

/** Moves to the top of the parabola through three values. */
function climb(valueAt: (atS: number) => number, atS: number, stepS: number): number {
  const before = valueAt(atS - stepS);
  const here = valueAt(atS);
  const after = valueAt(atS + stepS);
  const curvature = before - 2 * here + after;
  if (!(curvature < 0)) return atS;
  const move = (0.5 * (before - after)) / curvature;
  return atS + stepS * Math.max(-2, Math.min(2, move));
}

function searchStart(run: ChannelRun, nearS: number, speed: number): number {
  let best = nearS;
  let most = 0;
  for (let offsetS = -SEARCH_S; offsetS <= SEARCH_S; offsetS += SEARCH_STEP_S) {
    const value = Math.abs(project(run, markAt, nearS + offsetS, speed));
    if (value > most) {
      most = value;
      best = nearS + offsetS;
    }
  }
  return best;
}

/** Tells whether all quarters of the mark are there with one gain and one phase. */
function isWhole(run: ChannelRun, atS: number, speed: number, energy: number): boolean {
  const gains = Array.from({ length: QUARTERS }, (_, quarter) => {
    const span = [quarter / QUARTERS, (quarter + 1) / QUARTERS] as const;
    return {
      re: project(run, markAt, atS, speed, ...span) / energy,
      im: project(run, quadratureMarkAt, atS, speed, ...span) / energy,
    };
  });
  const sizes = gains.map(({ re, im }) => Math.hypot(re, im));
  const re = gains.reduce((sum, gain) => sum + gain.re, 0);
  const im = gains.reduce((sum, gain) => sum + gain.im, 0);
  const coherence = Math.hypot(re, im) / sizes.reduce((sum, size) => sum + size, 0);
  return coherence >= LEAST_COHERENCE && Math.min(...sizes) >= LEAST_QUARTER * Math.max(...sizes);
}

/**
 * Finds the beginning of a mark between the samples: the greatest correlation with the mark itself, which is known at
 * every instant, so that nothing is interpolated.
 *
 * @param run - holds the whole mark and some of what is beside it; not modified
 * @param nearS - within 0.15 ms of its beginning
 * @param speed - the player's clock against the recorder's; a chirp that runs fast by a share e seems early by
 *   e · 60 ms otherwise
 * @param isStartKnown - `nearS` comes from an earlier refinement
 * @returns null when it is no mark
 */
export function refineMark(
  run: ChannelRun,
  nearS: number,
  speed: number,
  isStartKnown: boolean,
): RefinedMark | null {
  let atS = isStartKnown ? nearS : searchStart(run, nearS, speed);
  const sign = Math.sign(project(run, markAt, atS, speed));
  for (const stepS of FINE_STEPS_S) {
    atS = climb((at) => sign * project(run, markAt, at, speed), atS, stepS);
  }
  const { sampleRateHz, fromS, samples } = run;
  let energy = 0;
  for (let n = 0; n <= MARK_DURATION_S * sampleRateHz; n++) energy += markAt(n / sampleRateHz) ** 2;
  if (sign === 0 || !isWhole(run, atS, speed, energy)) return null;
  const amplitude = project(run, markAt, atS, speed) / energy;
  let rest = 0;
  let count = 0;
  for (let n = 0; n < samples.length; n++) {
    const intoS = (n / sampleRateHz + fromS - atS) * speed;
    if (intoS < 0 || intoS > MARK_DURATION_S) continue;
    rest += (samples[n] - amplitude * markAt(intoS)) ** 2;
    count++;
  }
  const deviationS = Math.sqrt(rest / count / energy) / (Math.abs(amplitude) * RMS_RAD_PER_S);
  return { atS, amplitude, deviationS };
}
