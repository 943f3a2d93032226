import { dbToRatio } from '../level/decibel.js';
import { lsbOf } from '../level/quantisation.js';
import { countFramesInRun } from '../source/frame-run.js';
import type { SampleSource } from '../source/sample-source.js';
import type { WavOptions } from '../wav/create-wav-encoder.js';
import { framesOf, RAMP_S, type Body, type BodyOptions } from './bodies/body.js';
import { moveParts } from './bodies/programme-body.js';
import { STIMULUS_SCHEMA, type StimulusDescriptor } from './descriptor.js';
import { MARK_LEVEL_DBFS } from './mark-chirp.js';
import { markCodeOf, OTHER_PARAMETERS_CODE } from './mark-codes.js';
import { spanOfMark } from './sections/mark-section.js';
import { moveSection, renderSections, type Section } from './sections/section.js';
import {
  layOutStimulus,
  LEAD_IN_FREQUENCY_HZ,
  LEAD_IN_LEVEL_DBFS,
  type StimulusLayout,
} from './stimulus-layout.js';
import { resolveStimulusOptions, type ResolvedOptions, type StimulusOptions } from './stimulus-options.js';

export interface Stimulus {
  /** Two channels, rendered run by run; the writer of the file adds the dither. */
  readonly source: SampleSource;
  /** How the file must be written: bits, dither and its seed, and what must stand in it without dither. */
  readonly encoding: WavOptions;
  /** @param sha256 - hex, of the file's bytes */
  describe(sha256: string): StimulusDescriptor;
}

const PARAMETERS = ['frequencyHz', 'lowFrequencyHz', 'highFrequencyHz', 'levelDbfs', 'durationS'] as const;

/** Gives the number for the marks' gaps; null when the file has no marks. */
function codeOf(options: ResolvedOptions): number | null {
  const { kind, isBare, channels, sampleRateHz, isQuick } = options;
  if (isBare || kind.isDigitalZero) return null;
  const isDefault =
    channels === 'both' &&
    PARAMETERS.every(
      (key) => options[key] === (kind.defaults[key] ?? null) || (key === 'levelDbfs' && !kind.isLevelNamed),
    );
  return isDefault ? markCodeOf(kind.name, sampleRateHz, isQuick) : OTHER_PARAMETERS_CODE;
}

/** Keeps a full-scale tone off the ends of the scale: the largest code is 1 LSB short, and dither needs another. */
function limitAmplitude(amplitude: number, { bitsPerSample, dither }: ResolvedOptions): number {
  if (bitsPerSample === '32f') return amplitude;
  const marginLsb = dither === 'tpdf' ? 2 : 1;
  return Math.min(amplitude, 1 - marginLsb * lsbOf(bitsPerSample));
}

function bodyOptionsOf(options: ResolvedOptions): BodyOptions {
  const cap = (levelDbfs: number): number => Math.min(levelDbfs, options.ceilingDbfs ?? Infinity);
  return {
    ...options,
    cap,
    amplitudeOf: (levelDbfs) => limitAmplitude(dbToRatio(cap(levelDbfs)), options),
  };
}

function listSections(
  { sampleRateHz }: ResolvedOptions,
  { amplitudeOf }: BodyOptions,
  body: Body,
  layout: StimulusLayout,
): Section[] {
  const sections: Section[] = layout.marks.map(({ atS }) => ({
    kind: 'mark',
    channels: 'both',
    ...spanOfMark(atS, sampleRateHz),
    atS,
    amplitude: amplitudeOf(MARK_LEVEL_DBFS),
  }));
  if (layout.leadInToS > 0) {
    sections.push({
      kind: 'tone',
      channels: 'both',
      fromFrame: 0,
      originFrame: 0,
      frameCount: framesOf(layout.leadInToS, sampleRateHz),
      rampFrames: framesOf(RAMP_S, sampleRateHz),
      frequencyHz: LEAD_IN_FREQUENCY_HZ,
      phaseTurns: 0,
      amplitude: amplitudeOf(LEAD_IN_LEVEL_DBFS),
    });
  }
  return [...sections, ...body.sections.map((section) => moveSection(section, layout.bodyFromFrame))];
}

function createSource(
  { sampleRateHz, channels }: ResolvedOptions,
  sections: readonly Section[],
  frameCount: number,
): SampleSource {
  const render = (fromFrame: number, wanted: number): Float64Array[] => {
    const count = countFramesInRun(frameCount, fromFrame, wanted);
    const [left, right] = renderSections(sections, sampleRateHz, fromFrame, count);
    return [
      channels === 'right' ? new Float64Array(count) : left,
      channels === 'left' ? new Float64Array(count) : right,
    ];
  };
  return {
    sampleRateHz,
    channelCount: 2,
    frameCount,
    read: (fromFrame, count) => Promise.resolve().then(() => render(fromFrame, count)),
  };
}

function parametersOf(options: ResolvedOptions): Record<string, number | string> {
  const set = PARAMETERS.flatMap((key): [string, number][] => {
    const value = options[key];
    return value === null ? [] : [[key, value]];
  });
  const { ceilingDbfs, isQuick, kind } = options;
  return {
    ...Object.fromEntries(set),
    ...(ceilingDbfs === null ? {} : { ceilingDbfs }),
    ...(kind.defaults.isQuick === undefined ? {} : { form: isQuick ? 'quick' : 'full' }),
  };
}

/**
 * Makes a stimulus: 2 s of 997 Hz at -40 dBFS, a pair of marks, the body, a pair of marks; or the body alone. Steps and
 * ends are raised cosines. The source is a generator: it needs no more memory than the run that is read.
 *
 * @param name - one of `STIMULUS_NAMES`
 * @throws DspInputError `UNKNOWN_NAME`; `OUT_OF_RANGE` naming the parameter
 *
 * @example
 * const { source, encoding, describe } = createStimulus('sine', { sampleRateHz: 48_000, bitsPerSample: 24, isBare: true });
 * source.frameCount; // 480_000
 * encodeWavBlocks(source, encoding); // the file's bytes
 */
export function createStimulus(name: string, options: StimulusOptions): Stimulus {
  const resolved = resolveStimulusOptions(name, options);
  const { kind, sampleRateHz, bitsPerSample, dither, seed, channels } = resolved;
  const bodyOptions = bodyOptionsOf(resolved);
  const body = kind.layOut(bodyOptions);
  const layout = layOutStimulus(body.frameCount, sampleRateHz, codeOf(resolved));
  const { bodyFromFrame, frameCount, marks } = layout;
  return {
    source: createSource(resolved, listSections(resolved, bodyOptions, body, layout), frameCount),
    encoding: {
      bits: bitsPerSample,
      dither,
      seed,
      undithered: body.exact.map(({ from, to }) => ({ from: from + bodyFromFrame, to: to + bodyFromFrame })),
    },
    describe: (sha256) => ({
      schema: STIMULUS_SCHEMA,
      name: kind.name,
      parameters: parametersOf(resolved),
      sampleRateHz,
      bitsPerSample,
      dither,
      seed,
      channels,
      frameCount,
      sha256,
      marks,
      parts: moveParts(body.parts, bodyFromFrame / sampleRateHz).map((part) => ({
        ...part,
        channels: channels === 'both' ? part.channels : channels,
      })),
    }),
  };
}
