import type { StimulusDescriptor } from './descriptor.js';

/** Says "other parameters: the descriptor is needed". */
export const OTHER_PARAMETERS_CODE = 63;

/**
 * Names the stimulus, with its default parameters, in the gap between the two marks of a pair. Names whose stimuli are
 * still to come have their numbers already: a number once given never changes its meaning.
 */
export const MARK_CODES: ReadonlyMap<string, number> = new Map([
  ['sine', 1],
  ['low-level-tone', 2],
  ['level-steps', 3],
  ['sweep', 4],
  ['modulation-pair', 5],
  ['difference-pair', 6],
  ['modulation-steps', 7],
  ['difference-steps', 8],
  ['multitone', 9],
  ['separation', 10],
  ['jitter-test', 11],
  ['intersample-tone', 12],
  ['white-noise', 13],
  ['pink-noise', 14],
  ['square', 15],
  ['programme', 16],
  ['programme-quick', 17],
]);

/** Gives the name that a number stands for, null for the number of other parameters and for numbers not given yet. */
export function nameOfMarkCode(code: number): StimulusDescriptor['name'] | null {
  return [...MARK_CODES].find(([, given]) => given === code)?.[0] ?? null;
}

/** Tells whether a number is in use. */
export function isMarkCode(code: number): boolean {
  return code === OTHER_PARAMETERS_CODE || nameOfMarkCode(code) !== null;
}

/** Seconds from the beginning of a pair's first mark to that of its second. */
export function gapOfMarkCode(code: number): number {
  return (30 + code) / 100;
}
