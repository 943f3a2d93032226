import type { MeasureId, StimulusMatch } from '../../record/record.js';
import type { SampleSource } from '../../source/sample-source.js';
import type { AnalysisContext } from '../measure.js';
import type { KnownPart } from './open-analysis.js';

/** What is known of the stimulus before anything is measured. */
export interface StimulusKnowledge {
  readonly name: string;
  readonly recognisedBy: StimulusMatch['recognisedBy'];
  readonly delayS: number | null;
  readonly polarity: StimulusMatch['polarity'];
  /** Where its body lies in the recording; null when levels must tell. */
  readonly part: KnownPart | null;
  readonly frequencyHz: number | null;
  readonly levelDbfs: number | null;
}

/** The measure that reads each stimulus best. */
export const STIMULUS_MEASURES: Readonly<Record<string, MeasureId>> = {
  sine: 'tone',
  'low-level-tone': 'dynamic-range',
  silence: 'idle',
};

/**
 * Gathers what marks and descriptor say of the stimulus.
 *
 * @param source - the capture whole
 * @param assumedName - what the measure takes the recording for when nothing says
 */
export async function gatherStimulus(
  source: SampleSource,
  context: AnalysisContext,
  assumedName: string,
): Promise<StimulusKnowledge> {
  const { descriptor } = context;
  await Promise.resolve(source);
  const parameter = (key: string): number | null => {
    const value = descriptor?.parameters[key];
    return typeof value === 'number' && Number.isFinite(value) ? value : null;
  };
  return {
    name: descriptor?.name ?? assumedName,
    recognisedBy: descriptor ? 'descriptor' : 'signal',
    delayS: null,
    polarity: null,
    part: null,
    frequencyHz: parameter('frequencyHz'),
    levelDbfs: parameter('levelDbfs'),
  };
}
