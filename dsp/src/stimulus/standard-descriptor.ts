import { createStimulus } from './create-stimulus.js';
import type { StimulusDescriptor, StimulusPart } from './descriptor.js';
import { namedByMarkCode, type NamedByMarks } from './mark-codes.js';

/** Files that are alike at any rate are described at this one. */
const ANY_RATE_HZ = 48_000;

const described = new Map<number, StimulusDescriptor | null>();

/**
 * Describes the file that a number in the marks names: a stimulus with its default parameters.
 *
 * What marks don't tell is left as it usually is: the bits, and the level of a file that may have been scaled as a whole.
 *
 * @returns null for the number of other parameters and for numbers not given
 */
export function standardDescriptor(code: number): StimulusDescriptor | null {
  const before = described.get(code);
  if (before !== undefined) return before;
  const named = namedByMarkCode(code);
  const descriptor = named && describeStandard(named);
  described.set(code, descriptor);
  return descriptor;
}

function describeStandard({ name, sampleRateHz, isQuick }: NamedByMarks): StimulusDescriptor {
  const rate = sampleRateHz ?? ANY_RATE_HZ;
  const options = { sampleRateHz: rate, bitsPerSample: 24, ...(isQuick ? { isQuick } : {}) } as const;
  const { parts, ...file } = createStimulus(name, options).describe('');
  // Whether the exact pattern is that of 16 or of 24 bits only the recording can tell.
  const untold = ({ parameters, ...part }: StimulusPart): StimulusPart => ({
    ...part,
    parameters: Object.fromEntries(Object.entries(parameters).filter(([key]) => key !== 'bits')),
  });
  return { ...file, parts: parts.map(untold) };
}
