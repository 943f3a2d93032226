import { DspInputError } from '../../errors.js';
import { makeWarning } from '../../record/make-warning.js';
import type { BenchRecord } from '../../record/record.js';
import type { SampleSource } from '../../source/sample-source.js';
import type { AnalysisContext, AnalysisSettings, Measure } from '../measure.js';
import { alignStimulus, type AlignedStimulus } from '../shared/align-stimulus.js';
import { assembleRecord } from '../shared/assemble-record.js';
import { combineAll } from '../shared/combine-all.js';
import { isOverloaded } from '../shared/describe-recording.js';
import { emptyChannel, type FinishedChannel } from '../shared/finish-channel.js';
import { selectByName, settleSegment } from '../shared/open-analysis.js';
import { planFrames } from '../shared/plan-frames.js';
import { createProgress } from '../shared/progress.js';
import { settleBand, settleHighestHarmonic, type Band } from '../shared/settings-band.js';
import { cutWarnings } from '../shared/stimulus-knowledge.js';
import { powerDeviationDb } from '../shared/uncertainty.js';
import { combOfPart, usualComb, type ToneComb } from './comb.js';
import { COMB_FIGURES, combResult } from './comb-figures.js';
import { clockFromComb } from './find-comb.js';
import { COMB_WINDOW, readComb, type CombReading } from './read-comb.js';

/** Many tones at once: the response, and what they leave between them. */
export const multitoneMeasure: Measure = { id: 'multitone', title: 'Many tones', analyse: analyseMultitone };

const MARKS_SHARE = 0.3;
const SURVEY_SHARE = 0.4;
/** Share of the lower rate up to which tones count. */
const USABLE_SHARE = 0.45;
/** Seconds that part tones of 20 and 25 Hz. */
const WANTED_S = 1.3;

async function analyseMultitone(
  source: SampleSource,
  settings: AnalysisSettings,
  context: AnalysisContext,
): Promise<BenchRecord> {
  const progress = createProgress(context.onProgress);
  const band = settleBand(settings, source.sampleRateHz, null);
  const selected = selectByName(source, settings);
  const aligned = await alignStimulus(
    source,
    context,
    { measure: 'multitone', assumedName: 'multitone' },
    (share) => progress(share * MARKS_SHARE),
  );
  const range = await settleSegment(selected.source, settings, aligned.part, false, context, (share) =>
    progress(MARKS_SHARE + share * (SURVEY_SHARE - MARKS_SHARE)),
  );
  const usableHz = USABLE_SHARE * Math.min(source.sampleRateHz, aligned.file?.sampleRateHz ?? Infinity);
  const known = knownComb(aligned);
  const comb = known ?? usualComb(usableHz);
  const seen = await clockFromComb(selected.source, range, comb.frequenciesHz);
  if (seen === null && known === null) {
    throw new DspInputError('NOTHING_MEASURABLE', 'the recording doesn’t hold the tones of the stimulus', {
      remedy: 'Check that the right file was played and recorded, or give its descriptor.',
    });
  }
  const speed = seen ?? aligned.speed;
  // A tone a hair above the usable end by the clock's offset counts all the same.
  const played = comb.frequenciesHz.filter((hz) => hz <= usableHz * (1 + 1e-9));
  const plan = planFrames(range.to - range.from);
  const channels = await readComb(
    selected.source,
    range,
    plan,
    played.map((hz) => hz * speed),
    context,
    (share) => progress(SURVEY_SHARE + share * (1 - SURVEY_SHARE)),
  );
  const finished = channels.map((reading, index) =>
    finishComb(selected.names[index], reading, played, speed, band, context),
  );
  if (finished.every(({ result }) => result.figures['flatnessDb'] === null)) {
    throw new DspInputError('NOTHING_MEASURABLE', 'no channel holds the tones of the stimulus', {
      remedy: 'Check the cables and the recorder’s input, and record again.',
    });
  }
  const isShort = (range.to - range.from) / source.sampleRateHz < WANTED_S;
  return assembleRecord(source, settings, context, {
    measure: 'multitone',
    range,
    windowName: COMB_WINDOW,
    fftLength: plan.fftLength,
    averages: plan.starts.length,
    bandLowHz: band.lowHz,
    bandHighHz: band.highHz,
    highestHarmonic: settleHighestHarmonic(settings),
    reference: { unitFullScaleDbfs: null, from: null },
    stimulus: {
      name: aligned.name,
      recognisedBy: aligned.recognisedBy,
      delayS: aligned.delayS,
      clockOffsetPpm: seen === null ? aligned.clockOffsetPpm : (seen - 1) * 1e6,
      polarity: aligned.polarity,
    },
    channels: finished.map(({ result }) => result),
    warnings: [
      ...cutWarnings(aligned, context),
      ...band.warnings,
      ...(isShort ? [makeWarning('tones-unresolved', { wanted: WANTED_S })] : []),
      ...finished.flatMap(({ warnings }) => warnings),
    ],
  });
}

function knownComb({ parts, file }: AlignedStimulus): ToneComb | null {
  const part = parts.at(0) ?? file?.parts.find(({ measure }) => measure === 'multitone');
  return part === undefined ? null : combOfPart(part);
}

function finishComb(
  channel: string,
  reading: CombReading,
  playedHz: readonly number[],
  speed: number,
  band: Band,
  { capture }: AnalysisContext,
): FinishedChannel {
  const { level } = reading;
  const result = combResult(
    reading,
    playedHz.map((hz) => hz * speed),
    band,
  );
  if (result === null || level.samplePeak === 0) {
    return emptyChannel(channel, COMB_FIGURES, level.samplePeak === 0 ? 'channel-silent' : 'tone-missing');
  }
  const { figures, traces, rest } = result;
  return {
    result: {
      channel,
      figures,
      limits: {},
      uncertainty: combineAll({
        noiseAndDistortionDb: [{ name: 'estimate', value: powerDeviationDb(rest.meanSquare, rest.variance) }],
      }),
      harmonics: [],
      components: [],
      traces,
    },
    warnings: isOverloaded({ level, tone: { frequencyHz: playedHz[0] } }, capture)
      ? [makeWarning('recording-overloaded', { runs: level.clippedRunCount }, { channel })]
      : [],
  };
}
