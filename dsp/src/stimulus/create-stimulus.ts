import { dbToRatio } from '../level/decibel.js';
import { lsbOf } from '../level/quantisation.js';
import { countFramesInRun } from '../source/frame-run.js';
import type { SampleSource } from '../source/sample-source.js';
import { STIMULUS_SCHEMA, type StimulusDescriptor, type StimulusPart } from './descriptor.js';
import { MARK_LEVEL_DBFS } from './mark-chirp.js';
import { MARK_CODES, OTHER_PARAMETERS_CODE } from './mark-codes.js';
import { renderSections, type Section, type ToneSection } from './sections.js';
import {
  layOutStimulus,
  LEAD_IN_FREQUENCY_HZ,
  LEAD_IN_LEVEL_DBFS,
  RAMP_S,
  type StimulusLayout,
} from './stimulus-layout.js';
import { resolveStimulusOptions, type ResolvedOptions, type StimulusOptions } from './stimulus-options.js';

export interface Stimulus {
  /** Two channels, rendered run by run; the writer of the file adds the dither. */
  readonly source: SampleSource;
  /** @param sha256 - hex, of the file's bytes */
  describe(sha256: string): StimulusDescriptor;
}

/** Gives the number for the marks' gaps; null when the file has no marks. */
function codeOf(options: ResolvedOptions): number | null {
  const { kind, tone, isBare, channels, durationS } = options;
  if (isBare || kind.isDigitalZero) return null;
  const isDefault =
    tone?.frequencyHz === kind.tone?.frequencyHz &&
    durationS === kind.durationS &&
    channels === 'both' &&
    (!kind.isLevelNamed || tone?.levelDbfs === kind.tone?.levelDbfs);
  return (isDefault ? MARK_CODES.get(kind.name) : undefined) ?? OTHER_PARAMETERS_CODE;
}

/** Keeps a full-scale tone off the ends of the scale: the largest code is 1 LSB short, and dither needs another. */
function limitAmplitude(amplitude: number, { bitsPerSample, dither }: ResolvedOptions): number {
  if (bitsPerSample === '32f') return amplitude;
  const marginLsb = dither === 'tpdf' ? 2 : 1;
  return Math.min(amplitude, 1 - marginLsb * lsbOf(bitsPerSample));
}

function listSections(options: ResolvedOptions, layout: StimulusLayout): Section[] {
  const { sampleRateHz, tone } = options;
  const rampFrames = Math.round(RAMP_S * sampleRateHz);
  const amplitudeOf = (levelDbfs: number) =>
    limitAmplitude(dbToRatio(Math.min(levelDbfs, options.ceilingDbfs ?? 0)), options);
  const toneBetween = (fromS: number, toS: number, frequencyHz: number, levelDbfs: number): ToneSection => {
    const fromFrame = Math.round(fromS * sampleRateHz);
    const frameCount = Math.round(toS * sampleRateHz) - fromFrame;
    return {
      kind: 'tone',
      fromFrame,
      frameCount,
      rampFrames,
      frequencyHz,
      amplitude: amplitudeOf(levelDbfs),
    };
  };
  const sections: Section[] = layout.marks.map(({ atS }) => ({
    kind: 'mark',
    atS,
    amplitude: amplitudeOf(MARK_LEVEL_DBFS),
  }));
  if (layout.leadInToS > 0) {
    sections.push(toneBetween(0, layout.leadInToS, LEAD_IN_FREQUENCY_HZ, LEAD_IN_LEVEL_DBFS));
  }
  if (tone) sections.push(toneBetween(layout.bodyFromS, layout.bodyToS, tone.frequencyHz, tone.levelDbfs));
  return sections;
}

function describePart({ kind, tone, channels }: ResolvedOptions, layout: StimulusLayout): StimulusPart {
  // The ramps belong to no part: a part is steady from its first frame to its last.
  const rampS = tone ? RAMP_S : 0;
  const fromS = layout.bodyFromS + rampS;
  const toS = layout.bodyToS - rampS;
  const steps = tone ? [{ levelDbfs: tone.levelDbfs, fromS, toS }] : [];
  return { measure: kind.measure, channels, fromS, toS, parameters: { ...tone }, steps };
}

function createSource(options: ResolvedOptions, layout: StimulusLayout): SampleSource {
  const { sampleRateHz, channels } = options;
  const frameCount = Math.round(layout.durationS * sampleRateHz);
  const sections = listSections(options, layout);
  const render = (fromFrame: number, wanted: number): Float64Array[] => {
    const count = countFramesInRun(frameCount, fromFrame, wanted);
    const samples = renderSections(sections, sampleRateHz, fromFrame, count);
    return [
      channels === 'right' ? new Float64Array(count) : samples,
      channels === 'left' ? new Float64Array(count) : samples.slice(),
    ];
  };
  return {
    sampleRateHz,
    channelCount: 2,
    frameCount,
    read: (fromFrame, count) => Promise.resolve().then(() => render(fromFrame, count)),
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
 * const { source, describe } = createStimulus('sine', { sampleRateHz: 48_000, bitsPerSample: 24, isBare: true });
 * source.frameCount; // 480_000
 */
export function createStimulus(name: string, options: StimulusOptions): Stimulus {
  const resolved = resolveStimulusOptions(name, options);
  const { kind, tone, durationS, ceilingDbfs, sampleRateHz, bitsPerSample, dither, seed, channels } =
    resolved;
  const layout = layOutStimulus(durationS, codeOf(resolved));
  const source = createSource(resolved, layout);
  return {
    source,
    describe: (sha256) => ({
      schema: STIMULUS_SCHEMA,
      name: kind.name,
      parameters: { ...tone, durationS, ...(ceilingDbfs === null ? {} : { ceilingDbfs }) },
      sampleRateHz,
      bitsPerSample,
      dither,
      seed,
      channels,
      frameCount: source.frameCount,
      sha256,
      marks: layout.marks,
      parts: [describePart(resolved, layout)],
    }),
  };
}
