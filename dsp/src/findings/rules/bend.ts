import type { ChannelResult } from '../../record/record.js';
import { clipForDeviation, oneSidedFundamental, twoSidedFundamental } from '../clip-forms.js';
import { pointAt, pointsOf, type Point } from '../record-view.js';

/** How an output stops following near the top. */
export interface Bend {
  readonly kind: 'one-sided' | 'symmetric' | 'compression';
  readonly half: 'positive' | 'negative' | null;
  /** Stimulus level from which it no longer follows, dBFS. */
  readonly fromDbfs: number;
  readonly isHard: boolean;
  readonly top: Point;
}

/** Less than this is no bend: the figures of a recorder drift by so much (common practice, no source). */
const LEAST_DEVIATION_DB = 0.03;
/** Deviations from which a knee's place can be reckoned. */
const TELLING_DB = 0.004;
/** A hard knee's place comes out alike from every step within this, dB. */
const ALIKE_DB = 0.12;
/** Soft knees are placed where they cost so much. */
const SOFT_DB = -0.1;
/** A clipped stage is straight this far below the top; what bends there already is compression. */
const BELOW_TOP_DB = 6;
const COMPRESSION_SHARE = 0.08;
/** Crest against trough, beyond what a straight stage shows of itself. */
const ASYMMETRY_DB = 0.12;
/** Deviation of a fundamental clipped on one half grows as the excess to the power of 3/2. */
const ONSET_POWER = 2 / 3;

/** Reads the bend near the top out of one channel's level steps; null where it is straight. */
export function findBend(result: ChannelResult): Bend | null {
  const deviation = pointsOf(result, 'deviation').filter(({ x }) => x >= -30);
  const top = deviation.at(-1);
  const standardDb = result.uncertainty['maxDeviationDb']?.standard ?? 0;
  if (top === undefined || top.y > -Math.max(LEAST_DEVIATION_DB, 4 * standardDb)) return null;
  const below = deviation.filter(({ x }) => x <= top.x - BELOW_TOP_DB).at(-1);
  if (below !== undefined && below.y < COMPRESSION_SHARE * top.y) {
    return { kind: 'compression', half: null, fromDbfs: softKnee(deviation) ?? top.x, isHard: false, top };
  }
  const half = heldHalf(result, top.x);
  const isOneSided = half !== null || hasEvenHarmonics(result, top.x);
  const hard = hardKnee(deviation, isOneSided ? oneSidedFundamental : twoSidedFundamental);
  return {
    kind: isOneSided ? 'one-sided' : 'symmetric',
    half,
    fromDbfs: hard ?? softKnee(deviation) ?? top.x,
    isHard: hard !== null,
    top,
  };
}

/** Which half is smaller at the top than its share far below; null where both are alike. */
function heldHalf(result: ChannelResult, topDbfs: number): 'positive' | 'negative' | null {
  const [positive, negative] = ['positivePeak', 'negativePeak'].map((name) => pointsOf(result, name));
  const difference = (level: number): number | null => {
    const [crest, trough] = [pointAt(positive, level), pointAt(negative, level)];
    return crest === null || trough === null ? null : crest.y - trough.y;
  };
  const at = difference(topDbfs);
  const reference = positive
    .map(({ x }) => x)
    .filter((x) => x <= topDbfs - BELOW_TOP_DB && difference(x) !== null);
  const usual = reference.length === 0 ? 0 : (difference(reference[reference.length - 1]) ?? 0);
  if (at === null || Math.abs(at - usual) < ASYMMETRY_DB) return null;
  return at < usual ? 'positive' : 'negative';
}

/** Within this of the third, the second harmonic says that the halves differ. */
const EVEN_DB = 10;

/** Tells one half from both where the peaks themselves are not known. */
function hasEvenHarmonics(result: ChannelResult, topDbfs: number): boolean {
  const [second, third] = ['harmonic2', 'harmonic3'].map((name) => pointAt(pointsOf(result, name), topDbfs));
  return second !== null && second.y > (third?.y ?? -Infinity) - EVEN_DB;
}

/** The knee of a hard clip from every step that tells it, weighted by how much it deviates; null where they disagree. */
function hardKnee(deviation: readonly Point[], form: (c: number) => number): number | null {
  const knees = deviation
    .filter(({ y }) => y < -TELLING_DB)
    .map(({ x, y }) => ({ kneeDbfs: x + 20 * Math.log10(clipForDeviation(form, y)), weight: -y }));
  const telling = knees.filter(({ weight }) => weight > LEAST_DEVIATION_DB / 2);
  if (telling.length === 0) return null;
  const places = telling.map(({ kneeDbfs }) => kneeDbfs);
  if (Math.max(...places) - Math.min(...places) > ALIKE_DB) return null;
  const weights = telling.reduce((sum, { weight }) => sum + weight, 0);
  return telling.reduce((sum, { kneeDbfs, weight }) => sum + kneeDbfs * weight, 0) / weights;
}

/** The level at which a bend costs 0.1 dB, between two steps by its usual growth; null where it never does. */
function softKnee(deviation: readonly Point[]): number | null {
  const index = deviation.findIndex(({ y }) => y <= SOFT_DB);
  if (index < 1) return null;
  const [before, after] = [deviation[index - 1], deviation[index]];
  const grown = (y: number): number => Math.max(0, -y) ** ONSET_POWER;
  const share = (grown(SOFT_DB) - grown(before.y)) / (grown(after.y) - grown(before.y));
  return before.x + share * (after.x - before.x);
}
