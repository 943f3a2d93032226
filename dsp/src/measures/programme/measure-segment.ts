import { DspInputError } from '../../errors.js';
import { makeWarning } from '../../record/make-warning.js';
import type { BenchRecord, RecordBody, Warning } from '../../record/record.js';
import type { SampleSource } from '../../source/sample-source.js';
import type { AnalysisContext, AnalysisSettings, Measure } from '../measure.js';
import { partNumber, type AlignedStimulus } from '../shared/align-stimulus.js';
import type { PartGroup } from './group-parts.js';
import { partTitle, stimulusNameOf } from './name-of-part.js';

export interface SegmentResult {
  readonly body: RecordBody | null;
  readonly warnings: readonly Warning[];
}

/** Filters of player and recorder ring on past a part's ramps for less than this. */
const SETTLING_S = 0.05;
/** What is left of a part that the recording cuts must be this long to be worth measuring. */
const SHORTEST_S = 0.5;

/**
 * Measures one part of a programme, or says why it could not be. Whatever a part throws stays with the part.
 *
 * @param knowledge - of the programme
 * @param measure - of the part
 * @throws DspInputError `CANCELLED`; errors that are not typed are faults of ours and go on
 */
export async function measureSegment(
  source: SampleSource,
  settings: AnalysisSettings,
  context: AnalysisContext,
  knowledge: AlignedStimulus,
  group: PartGroup,
  measure: Measure,
): Promise<SegmentResult> {
  const durationS = source.frameCount / source.sampleRateHz;
  const title = partTitle(group[0]);
  const fromS = Math.max(0, group[0].fromS);
  const toS = Math.min(durationS, group[group.length - 1].toS);
  if (toS - fromS < Math.min(SHORTEST_S, (group[0].toS - group[0].fromS) / 2)) {
    return { body: null, warnings: [makeWarning('segment-missing', { name: title })] };
  }
  const cut = group.every(({ isWhole }) => isWhole)
    ? []
    : [makeWarning('segment-cut', { name: title, from: fromS.toFixed(2), to: toS.toFixed(2) })];
  const placed: AlignedStimulus = {
    ...knowledge,
    name: stimulusNameOf(group[0]),
    part: settle(fromS, toS),
    frequencyHz: partNumber(group[0], 'frequencyHz'),
    levelDbfs: knowledge.isLevelKnown ? partNumber(group[0], 'levelDbfs') : null,
    parts: group,
  };
  try {
    const record = await measure.analyse(source, settings, {
      ...context,
      fileWarnings: [],
      descriptor: null,
      placed,
    });
    return { body: bodyOf(record, cut), warnings: cut };
  } catch (error) {
    if (!(error instanceof DspInputError) || error.code === 'CANCELLED') throw error;
    return {
      body: null,
      warnings: [makeWarning('segment-not-measured', { name: title, reason: error.message })],
    };
  }
}

function settle(fromS: number, toS: number): { fromS: number; toS: number } {
  const settling = Math.min(SETTLING_S, (toS - fromS) / 8);
  return { fromS: fromS + settling, toS: toS - settling };
}

/** A segment is a record without its head; the cut is told once more where it is looked at alone. */
function bodyOf(record: BenchRecord, cut: readonly Warning[]): RecordBody {
  const { measure, settings, reference, stimulus, channels, between, findings, warnings, segments } = record;
  return {
    measure,
    // The rig's record and the calibration stand once, in the programme's own settings.
    settings: { ...settings, baseline: null },
    reference,
    stimulus,
    channels,
    between,
    findings,
    warnings: [...cut, ...warnings],
    segments,
  };
}
