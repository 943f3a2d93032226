/** Says "other parameters: the descriptor is needed". */
export const OTHER_PARAMETERS_CODE = 63;

/** What a number in the marks stands for: a stimulus with its default parameters. */
export interface NamedByMarks {
  readonly name: string;
  /** The file's rate, where what it holds depends on it. */
  readonly sampleRateHz: number | null;
  /** The short form. */
  readonly isQuick: boolean;
}

/** Numbers of stimuli that are alike at any rate. */
const ANY_RATE: readonly (readonly [number, string])[] = [
  [1, 'sine'],
  [2, 'low-level-tone'],
  [3, 'level-steps'],
  [5, 'modulation-pair'],
  [6, 'difference-pair'],
  [7, 'modulation-steps'],
  [8, 'difference-steps'],
  [14, 'pink-noise'],
  [15, 'square'],
];

/** Numbers at 48 kHz of those that aren't; the other rates' follow from 18 on, five a stimulus. */
const AT_48_KHZ: readonly (readonly [number, string, boolean])[] = [
  [4, 'sweep', false],
  [9, 'multitone', false],
  [10, 'separation', false],
  [11, 'jitter-test', false],
  [12, 'intersample-tone', false],
  [13, 'white-noise', false],
  [16, 'programme', false],
  [17, 'programme', true],
];
const OTHER_RATES_HZ = [44_100, 88_200, 96_000, 176_400, 192_000] as const;
const FIRST_OTHER = 18;

/** Names the stimulus in the gap between the two marks of a pair. A number once given never changes its meaning. */
export const MARK_CODES: ReadonlyMap<number, NamedByMarks> = new Map([
  ...ANY_RATE.map(([code, name]): [number, NamedByMarks] => [
    code,
    { name, sampleRateHz: null, isQuick: false },
  ]),
  ...AT_48_KHZ.flatMap(([code, name, isQuick], index): [number, NamedByMarks][] => [
    [code, { name, sampleRateHz: 48_000, isQuick }],
    ...OTHER_RATES_HZ.map((sampleRateHz, rate): [number, NamedByMarks] => [
      FIRST_OTHER + index * OTHER_RATES_HZ.length + rate,
      { name, sampleRateHz, isQuick },
    ]),
  ]),
]);

/** Gives what a number stands for, null for the number of other parameters and for numbers not given yet. */
export function namedByMarkCode(code: number): NamedByMarks | null {
  return MARK_CODES.get(code) ?? null;
}

/** Gives the number of a stimulus with its default parameters; that of other parameters where it has none. */
export function markCodeOf(name: string, sampleRateHz: number, isQuick: boolean): number {
  const found = [...MARK_CODES].find(
    ([, named]) =>
      named.name === name &&
      named.isQuick === isQuick &&
      (named.sampleRateHz === null || named.sampleRateHz === sampleRateHz),
  );
  return found?.[0] ?? OTHER_PARAMETERS_CODE;
}

/** Tells whether a number is in use. */
export function isMarkCode(code: number): boolean {
  return code === OTHER_PARAMETERS_CODE || MARK_CODES.has(code);
}

/** Seconds from the beginning of a pair's first mark to that of its second. */
export function gapOfMarkCode(code: number): number {
  return (30 + code) / 100;
}
