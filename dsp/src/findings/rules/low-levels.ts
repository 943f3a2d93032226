import type { Finding } from '../../record/record.js';
import { pointsOf, type Point, type RecordView } from '../record-view.js';
import { channelWord, makeFinding, proof, rounded } from '../words.js';

const BETWEEN = { high: -10, low: -45 } as const;
/** In absolute level a bend of the crest's third harmonic falls with the level; that of a dead zone stays within this. */
const STEADY_DB = 8;
const LEAST_POINTS = 3;
const LEAST_SPAN_DB = 25;
/** Of the third harmonic at -20 dBFS (common practice, no source). */
const LEAST_THIRD_DB = -95;

/** Dead zone about zero: the third harmonic keeps its absolute level while the tone falls. */
export function crossoverRule(view: RecordView): Finding[] {
  return view.channels('level-steps').flatMap(({ channel, result }): Finding[] => {
    const third = pointsOf(result, 'harmonic3').filter(({ x }) => x <= BETWEEN.high && x >= BETWEEN.low);
    if (third.length < LEAST_POINTS || third[third.length - 1].x - third[0].x < LEAST_SPAN_DB) return [];
    const absolute = third.map(({ x, y }) => x + y);
    const spread = Math.max(...absolute) - Math.min(...absolute);
    const at20 = nearest(third, -20);
    const lowest = third[0];
    const isRising = lowest.y - third[third.length - 1].y > 15;
    const isOdd = medianGap(result, third) > 6;
    if (at20.y < LEAST_THIRD_DB || spread > STEADY_DB || !isRising || !isOdd) return [];
    return [
      makeFinding({
        code: 'crossover-distortion',
        severity: at20.y > -70 ? 'fault' : 'caution',
        channel,
        summary: `${channelWord(channel)} loses a little about zero at every level: odd harmonics grow as the level falls, the third to ${rounded(lowest.y, 0)} dB at ${rounded(lowest.x, 0)} dBFS.`,
        evidence: [
          proof('third harmonic at -20 dBFS', at20.y, 'dB'),
          proof(`third harmonic at ${rounded(lowest.x, 0)} dBFS`, lowest.y, 'dB'),
        ],
        confirmBy:
          'Measure again warm, after an hour, and without a load: crossover distortion changes with both. Look at the residual over the wave: its spikes stand at the zero crossings.',
      }),
    ];
  });
}

/** How far the third harmonic stands above the second, dB. */
function medianGap(result: Parameters<typeof pointsOf>[0], third: readonly Point[]): number {
  const second = pointsOf(result, 'harmonic2');
  const gaps = third.map(({ x, y }) => y - (second.find((point) => point.x === x)?.y ?? -200));
  gaps.sort((one, other) => one - other);
  return gaps[gaps.length >> 1];
}

function nearest(points: readonly Point[], x: number): Point {
  return points.reduce((one, other) => (Math.abs(other.x - x) < Math.abs(one.x - x) ? other : one));
}

const BUSY = { high: -40, low: -80 } as const;
/** Half of the least step of 16 bits is a tone of -96.3 dBFS. */
const QUIET_BELOW_DBFS = -98;
/** Noise that falls by so much once the tone is too small to move a code is the codes' own. */
const LEAST_FALL_DB = 5;
const LEAST_HARMONICS = 2;

/** Rounding without dither: what is left beside the tone comes and goes with it. */
export function truncationRule(view: RecordView): Finding[] {
  return view.channels('level-steps').flatMap(({ channel, result }): Finding[] => {
    const noise = pointsOf(result, 'residual');
    const busy = noise.filter(({ x }) => x <= BUSY.high && x >= BUSY.low).map(({ y }) => y);
    const quiet = noise.filter(({ x }) => x < QUIET_BELOW_DBFS).map(({ y }) => y);
    if (busy.length < 3 || quiet.length === 0) return [];
    const fall = median(busy) - median(quiet);
    const harmonics = pointsOf(result, 'thd').filter(({ x, y }) => x <= -50 && x >= -95 && y > -60);
    if (fall < LEAST_FALL_DB || harmonics.length < LEAST_HARMONICS) return [];
    return [
      makeFinding({
        code: 'truncation',
        severity: 'caution',
        channel,
        summary: `${channelWord(channel)} rounds without dither: what stands beside the tone at low levels falls by ${rounded(fall, 0)} dB once the tone is too small to move a code.`,
        evidence: [
          proof('residual from -40 to -80 dBFS', median(busy), 'dBFS'),
          proof('residual below -98 dBFS', median(quiet), 'dBFS'),
        ],
        confirmBy:
          'Play the same steps as a file of 24 bits with every volume control, equaliser and resampler off: what is left of it is the player’s own word length.',
      }),
    ];
  });
}

function median(values: readonly number[]): number {
  const sorted = [...values].sort((one, other) => one - other);
  return sorted[sorted.length >> 1];
}
