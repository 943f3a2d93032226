/** What a stimulus is for, in a reader's words. */
export interface StimulusEntry {
  readonly name: string;
  readonly title: string;
  /** What it is and what it tells, in a sentence or two. */
  readonly about: string;
}

export interface StimulusGroup {
  readonly question: string;
  readonly entries: readonly StimulusEntry[];
}

/** Every stimulus under the question that it answers. */
export const STIMULUS_GROUPS: readonly StimulusGroup[] = [
  {
    question: 'Everything at once',
    entries: [
      {
        name: 'programme',
        title: 'Programme',
        about:
          'Every part in one file: play it once, record it once, and every measure comes out of the one recording.',
      },
    ],
  },
  {
    question: 'What is left beside a tone?',
    entries: [
      {
        name: 'sine',
        title: 'Single tone',
        about: 'One steady tone: harmonics, noise, and the residual over the wave.',
      },
      {
        name: 'low-level-tone',
        title: 'Quiet tone',
        about: 'A tone 60 dB down, which keeps mutes open: the dynamic range.',
      },
      { name: 'silence', title: 'Silence', about: 'Digital zero: noise, hum and lines of an idle unit.' },
      {
        name: 'square',
        title: 'Square wave',
        about: 'Odd harmonics up to the band’s end: the shape of the wave.',
      },
    ],
  },
  {
    question: 'How does it change with level?',
    entries: [
      {
        name: 'level-steps',
        title: 'Level steps',
        about:
          'A tone from full scale down into the noise: whether the output follows, and what is added on the way.',
      },
      {
        name: 'intersample-tone',
        title: 'Tone between samples',
        about: 'A tone whose wave goes 3 dB beyond its samples: whether a converter has room for it.',
      },
    ],
  },
  {
    question: 'What do two tones make of each other?',
    entries: [
      {
        name: 'modulation-pair',
        title: 'Low and high tone',
        about: 'How a strong low tone modulates a weak high one.',
      },
      {
        name: 'difference-pair',
        title: 'Two high tones',
        about: 'Difference tones of two high tones of one level.',
      },
      {
        name: 'modulation-steps',
        title: 'Low and high tone in steps',
        about: 'The same from full scale down.',
      },
      { name: 'difference-steps', title: 'Two high tones in steps', about: 'The same from full scale down.' },
    ],
  },
  {
    question: 'How does it change with frequency?',
    entries: [
      {
        name: 'sweep',
        title: 'Sweep',
        about: 'Response, phase, impulse, and harmonics against frequency, in one take.',
      },
      {
        name: 'multitone',
        title: 'Many tones',
        about: 'A tone every third of an octave, and what stands between them.',
      },
      {
        name: 'separation',
        title: 'Sweep in one channel at a time',
        about: 'What leaks from left to right and back; balance, delay and polarity between them.',
      },
      {
        name: 'white-noise',
        title: 'White noise',
        about: 'The filter of a player, and the images it leaves.',
      },
      { name: 'pink-noise', title: 'Pink noise', about: 'Equal power in every octave, for matching levels.' },
    ],
  },
  {
    question: 'How steady is its clock?',
    entries: [
      {
        name: 'jitter-test',
        title: 'Jitter test',
        about:
          'A quarter of the rate with the last bit switched slowly. Exact to the bit: nothing may change it on the way.',
      },
    ],
  },
];

export function findEntry(name: string): StimulusEntry {
  const entries = STIMULUS_GROUPS.flatMap((group) => group.entries);
  return entries.find((entry) => entry.name === name) ?? { name, title: name, about: '' };
}
