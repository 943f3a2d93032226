import { measureTitle, toneWords } from '@/lib/capture-words';
import { formatCounted } from '@/lib/format/quantity';
import { worthOfFigure } from '@/lib/worth';
import type { ServedBody } from '../api/record-queries';
import { toneOf } from './record-words';

/** "sweep", "tone", and what tells it from others of its kind: "997 Hz at -1.0 dBFS", "modulation". */
export function partTitle(body: ServedBody): { title: string; detail: string | null } {
  return { title: measureTitle(body.measure), detail: toneWords(toneOf(body)) ?? pairKind(body) };
}

function pairKind({ measure, channels }: ServedBody): string | null {
  if (measure !== 'two-tone' && measure !== 'two-tone-steps') return null;
  const keys = channels.flatMap(({ figures, traces }) => [...Object.keys(figures), ...Object.keys(traces)]);
  return keys.some((key) => key.startsWith('modulationDistortion')) ? 'modulation' : 'difference';
}

/** The figures that say most about a measure, at most two. */
const MAIN_FIGURES: Partial<Record<ServedBody['measure'], readonly string[]>> = {
  tone: ['thdPlusNoiseDb', 'thdDb'],
  idle: ['noiseAWeightedDbfs', 'humDbfs'],
  'dynamic-range': ['dynamicRangeAWeightedDb', 'dynamicRangeDb'],
  'two-tone': ['modulationDistortionDb', 'differenceD2Db', 'differenceD3Db'],
  'level-steps': ['linearDownToDbfs', 'maxDeviationDb'],
  sweep: ['flatnessDb', 'minus3DbHighHz'],
  multitone: ['noiseAndDistortionDb', 'flatnessDb'],
  separation: ['separationLeftToRightAt1kHzDb', 'separationRightToLeftAt1kHzDb'],
  jitter: ['jitterPeakToPeakPs'],
  intersample: ['levelErrorDb', 'thdDb'],
  filter: ['passBandRippleDb', 'minus3DbHighHz'],
  loudness: ['integratedLufs', 'truePeakDbtp'],
};
const MOST_MAIN = 2;

/** Keys of the figures a row shows, as far as the body has them. */
export function mainKeysOf(body: ServedBody): readonly string[] {
  const present = new Set([...body.channels, body.between].flatMap(({ figures }) => Object.keys(figures)));
  return (MAIN_FIGURES[body.measure] ?? []).filter((key) => present.has(key)).slice(0, MOST_MAIN);
}

/** What to know of a part in a few words: findings, warnings, figures that only the rig holds down. */
export function partState(body: ServedBody): string {
  const atRig = body.channels.reduce(
    (count, { figures, limits }) =>
      count +
      Object.entries(figures).filter(([key, value]) => worthOfFigure(key, value, limits[key])?.worth === 'at')
        .length,
    0,
  );
  const parts = [
    body.findings.length > 0 && formatCounted(body.findings.length, 'finding'),
    body.warnings.length > 0 && formatCounted(body.warnings.length, 'warning'),
    atRig > 0 && `${formatCounted(atRig, 'figure')} at the floor`,
  ].filter((part) => part !== false);
  return parts.length === 0 ? 'nothing to note' : parts.join(', ');
}
