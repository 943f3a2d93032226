import { DspInputError } from '../../errors.js';
import { makeWarning } from '../../record/make-warning.js';
import type { BenchRecord, RecordBody } from '../../record/record.js';
import type { SampleSource } from '../../source/sample-source.js';
import type { AnalysisContext, AnalysisSettings, Measure } from '../measure.js';
import { alignStimulus, type AlignedStimulus } from '../shared/align-stimulus.js';
import { assembleRecord } from '../shared/assemble-record.js';
import { selectByName } from '../shared/open-analysis.js';
import { createProgress } from '../shared/progress.js';
import { settleBand, settleHighestHarmonic } from '../shared/settings-band.js';
import { groupParts } from './group-parts.js';
import { measureSegment } from './measure-segment.js';
import { partTitle } from './name-of-part.js';
import { placeParts } from './place-parts.js';

/** Share of the work that finding the marks takes. */
const MARKS_SHARE = 0.08;

/**
 * Makes the measure of a programme: every part found, aligned and measured by its own measure, in one record.
 *
 * @param measures - those that the parts call for; a part without one is named in a warning
 */
export function createProgrammeMeasure(measures: readonly Measure[]): Measure {
  return {
    id: 'programme',
    title: 'Programme',
    analyse: (source, settings, context) => analyseProgramme(measures, source, settings, context),
  };
}

async function analyseProgramme(
  measures: readonly Measure[],
  source: SampleSource,
  settings: AnalysisSettings,
  context: AnalysisContext,
): Promise<BenchRecord> {
  if (settings.fromS !== undefined || settings.toS !== undefined) refuseRange(settings, context);
  const progress = createProgress(context.onProgress);
  const band = settleBand(settings, source.sampleRateHz, null);
  const { names } = selectByName(source, settings);
  const knowledge = await alignStimulus(
    source,
    context,
    { measure: 'programme', assumedName: 'programme' },
    (share) => progress(share * MARKS_SHARE),
  );
  const place = await placeParts(source, knowledge);
  const aligned: AlignedStimulus = {
    ...knowledge,
    speed: place.speed,
    clockOffsetPpm: place.isClockKnown ? (place.speed - 1) * 1e6 : null,
  };
  const groups = groupParts(place.parts);
  const totalS = groups.reduce((sum, group) => sum + durationOf(group), 0);
  const segments: RecordBody[] = [];
  const warnings = [...place.warnings];
  let doneS = 0;
  for (const group of groups) {
    const measure = measures.find(({ id }) => id === group[0].measure);
    if (measure === undefined) {
      warnings.push(
        makeWarning('segment-not-measured', {
          name: partTitle(group[0]),
          reason: 'there is no such measure',
        }),
      );
      continue;
    }
    const share = durationOf(group) / totalS;
    const before = doneS / totalS;
    const tell = (part: number): void => {
      progress(MARKS_SHARE + (1 - MARKS_SHARE) * (before + share * part));
    };
    const result = await measureSegment(
      source,
      askedOf(settings),
      { ...context, onProgress: tell },
      aligned,
      group,
      measure,
    );
    if (result.body !== null) segments.push(result.body);
    warnings.push(...result.warnings);
    doneS += durationOf(group);
  }
  if (segments.length === 0) {
    throw new DspInputError('NOTHING_MEASURABLE', 'no part of the programme could be measured', {
      remedy: 'Check that the right file was played and the recorder’s input was open.',
    });
  }
  const reference = referenceOf(segments);
  return assembleRecord(source, settings, context, {
    measure: 'programme',
    range: { from: 0, to: source.frameCount },
    windowName: 'none',
    fftLength: 0,
    averages: 0,
    bandLowHz: band.lowHz,
    bandHighHz: band.highHz,
    highestHarmonic: settleHighestHarmonic(settings),
    reference,
    stimulus: {
      name: 'programme',
      recognisedBy: knowledge.recognisedBy,
      delayS: knowledge.delayS,
      clockOffsetPpm: aligned.clockOffsetPpm,
      polarity: knowledge.polarity,
    },
    channels: names.map((channel) => ({
      channel,
      figures: {},
      limits: {},
      uncertainty: {},
      harmonics: [],
      components: [],
      traces: {},
    })),
    between: { figures: { clockOffsetPpm: aligned.clockOffsetPpm }, traces: {} },
    segments: segments.map((segment) => ({
      ...segment,
      reference: segment.reference.unitFullScaleDbfs === null ? reference : segment.reference,
    })),
    warnings,
  });
}

/** The parts' places are the programme's own. */
function askedOf(settings: AnalysisSettings): AnalysisSettings {
  return { ...settings, fromS: undefined, toS: undefined };
}

function durationOf(group: readonly { readonly fromS: number; readonly toS: number }[]): number {
  return group.reduce((sum, { fromS, toS }) => sum + toS - fromS, 0);
}

/** The steps know the unit's full scale best: from their level far below any bend. */
function referenceOf(segments: readonly RecordBody[]): RecordBody['reference'] {
  const known = segments.filter(({ reference }) => reference.unitFullScaleDbfs !== null);
  const best = known.find(({ measure }) => measure === 'level-steps') ?? known.at(0);
  return best?.reference ?? { unitFullScaleDbfs: null, from: null };
}

/** A whole recording spelt out as a range, as a record's settings do, is no range. */
function refuseRange({ fromS, toS }: AnalysisSettings, { capture }: AnalysisContext): void {
  const isWhole = (fromS ?? 0) === 0 && (toS ?? capture.durationS) >= capture.durationS * (1 - 1e-8);
  if (isWhole) return;
  throw new DspInputError('BAD_ARGUMENT', 'a programme is measured whole: leave the range out', {
    remedy: 'To look at a stretch of it, name one of its measures.',
  });
}
