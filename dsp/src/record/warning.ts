/** The closed list of warnings, each with a sentence for people. `{…}` is filled in by the measure. */
export const WARNING_SENTENCES = {
  'file-size-lies': 'The file says it holds {declared} but holds {present}: the recorder was probably cut off. The whole frames present were measured.',
  'stimulus-assumed': 'The recording has neither marks nor a descriptor: it was measured as a {name}, with levels relative to the loudest part.',
} as const;

export type WarningCode = keyof typeof WARNING_SENTENCES;
