import { createRandom } from '../../random/create-random.js';
import { addTone } from './tone-section.js';
import type { SectionRun, Span } from './span.js';

/** Many tones of one amplitude with random phases, whose sum keeps to a peak. */
export interface MultitoneSection extends Span {
  readonly kind: 'multitone';
  readonly rampFrames: number;
  readonly frequenciesHz: readonly number[];
  /** The sum goes no higher. */
  readonly peak: number;
  readonly seed: number;
}

/** Draws of phases of which the one with the least peak is taken. */
const DRAWS = 8;
/** Frames in which the draws are compared; the peak of the one taken is that of all its frames. */
const COMPARED_FRAMES = 65_536;
/** Rounding of the rotations below over a file. */
const ROUNDING = 1 + 1e-6;

interface Phases {
  readonly turns: readonly number[];
  readonly peak: number;
}

/** Greatest magnitude of the sum of unit tones, each turned on from frame to frame. */
function peakOfSum(
  frequenciesHz: readonly number[],
  turns: readonly number[],
  sampleRateHz: number,
  frames: number,
): number {
  const sums = new Float64Array(frames);
  frequenciesHz.forEach((frequencyHz, k) => {
    const [stepRe, stepIm] = [2 * Math.PI * (frequencyHz / sampleRateHz)].flatMap((w) => [
      Math.cos(w),
      Math.sin(w),
    ]);
    let [re, im] = [Math.cos(2 * Math.PI * turns[k]), Math.sin(2 * Math.PI * turns[k])];
    for (let n = 0; n < frames; n++) {
      sums[n] += im;
      const next = re * stepRe - im * stepIm;
      im = re * stepIm + im * stepRe;
      re = next;
    }
  });
  return sums.reduce((peak, sum) => Math.max(peak, Math.abs(sum)), 0);
}

const known = new Map<string, Phases>();

/** Rules for phases make no low peak of tones spaced evenly in octaves; the best of some random draws does as well. */
function phasesOf({ frequenciesHz, seed, frameCount }: MultitoneSection, sampleRateHz: number): Phases {
  const key = `${sampleRateHz}/${frameCount}/${seed}`;
  const before = known.get(key);
  if (before) return before;
  const compared = Math.min(frameCount, COMPARED_FRAMES);
  const draws = Array.from({ length: DRAWS }, (_, draw): Phases => {
    const random = createRandom((seed + draw) >>> 0);
    const turns = frequenciesHz.map(() => random());
    return { turns, peak: peakOfSum(frequenciesHz, turns, sampleRateHz, compared) };
  });
  const { turns } = draws.reduce((one, other) => (other.peak < one.peak ? other : one));
  const best = { turns, peak: ROUNDING * peakOfSum(frequenciesHz, turns, sampleRateHz, frameCount) };
  known.clear(); // one is enough: a file is rendered from its beginning to its end
  known.set(key, best);
  return best;
}

export function addMultitone(section: MultitoneSection, run: SectionRun): void {
  const { turns, peak } = phasesOf(section, run.sampleRateHz);
  section.frequenciesHz.forEach((frequencyHz, index) => {
    addTone(
      {
        ...section,
        kind: 'tone',
        originFrame: section.fromFrame,
        frequencyHz,
        phaseTurns: turns[index],
        amplitude: section.peak / peak,
      },
      run,
    );
  });
}
