import { getMeasure } from '../../measures/registry.js';
import { analyseSamples } from '../../measures/testing/analyse-samples.js';
import type { PracticeStage } from '../../practice/device.js';
import { pass } from '../../practice/testing/pass.js';
import type { BenchRecord, Finding, MeasureId } from '../../record/record.js';
import { createStimulus } from '../../stimulus/create-stimulus.js';
import type { StimulusOptions } from '../../stimulus/stimulus-options.js';
import { proposeFindings } from '../propose-findings.js';

export interface PlayOptions extends Partial<StimulusOptions> {
  readonly name?: string;
  readonly measure?: MeasureId;
  /** Word length that the recording claims; 24 unless given. */
  readonly bits?: number;
}

/** Plays a stimulus through stages of a device, measures the recording and proposes findings. */
export async function findIn(
  stages: readonly PracticeStage[],
  { name = 'programme', measure = 'programme', bits = 24, ...options }: PlayOptions = {},
): Promise<{ record: BenchRecord; findings: Finding[] }> {
  const sampleRateHz = options.sampleRateHz ?? 48_000;
  const { source } = createStimulus(name, {
    sampleRateHz,
    bitsPerSample: 24,
    ...(name === 'programme' ? { isQuick: true } : {}),
    ...options,
  });
  const channels = pass(await source.read(0, source.frameCount), sampleRateHz, stages);
  const record = await analyseSamples(getMeasure(measure), channels, sampleRateHz, { bits });
  return { record, findings: proposeFindings(record) };
}
