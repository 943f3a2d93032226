/** The closed list of warnings, each with a sentence for people. `{…}` is filled in by the measure. */
export const WARNING_SENTENCES = {
  'file-size-lies':
    'The file says it holds {declared} but holds {present}: the recorder was probably cut off. The whole frames present were measured.',
  // the file
  'size-not-set':
    'The header gives no length for the samples (it says {declared}), as a recorder writes that streams or was cut off: all that follows was measured, {present}.',
  'last-frame-cut':
    'The samples end with {bytes} of an incomplete frame at byte {offset}: they were left out.',
  'riff-size-wrong':
    'The header says the file holds {declared}, and it holds {present}: the statement was ignored.',
  'size-table-missing':
    'The file is {container} and has no readable ds64 chunk with its 64-bit sizes: sizes were taken from the chunks.',
  'pad-byte-missing':
    'The pad byte after the odd-sized chunk {chunk} at byte {offset} is missing: the next chunk was found without it.',
  'chunk-cut-short':
    'The chunk {chunk} at byte {offset} says it holds {declared}, and {present} are left: it was not read.',
  'chunk-malformed':
    'The chunk {chunk} at byte {offset} holds {present}, and {expected} are needed: it was not read.',
  'trailing-bytes': 'From byte {offset} on, {present} belong to no chunk: they were not read.',
  'too-many-chunks': 'The file has more than {count} chunks: those from byte {offset} on were not read.',
  'second-data-chunk':
    'The file has another data chunk at byte {offset}: the one at byte {measured} was measured.',
  'byte-rate-wrong':
    'The fmt chunk gives {found} bytes a second at byte {offset}, where rate and block size make it {expected}: ignored.',
  'frame-count-differs':
    'The {chunk} chunk counts {declared} frames, and the samples make {present}: the samples count.',
  'valid-bits-exceeded':
    'The samples use more than the {bits} bits the header calls valid: they were read as they stand, against the full scale of {containerBits} bits.',
  'over-full-scale':
    'The channel {channel} has {count} samples beyond full scale, up to {peak} times full scale: they were kept as they are.',
  'stimulus-assumed':
    'The recording has neither marks nor a descriptor: it was measured as a {name}, with levels relative to the loudest part.',
} as const;

export type WarningCode = keyof typeof WARNING_SENTENCES;
