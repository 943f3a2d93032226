import { DspInputError } from '../../errors.js';
import { createLevelMeter } from '../../level/create-level-meter.js';
import { createTruePeakMeter } from '../../level/create-true-peak-meter.js';
import { ratioToDb } from '../../level/decibel.js';
import { makeWarning } from '../../record/make-warning.js';
import type { BenchRecord, Warning } from '../../record/record.js';
import type { SampleSource } from '../../source/sample-source.js';
import type { AnalysisContext, AnalysisSettings, Measure } from '../measure.js';
import { assembleRecord } from '../shared/assemble-record.js';
import { selectByName, settleSegment } from '../shared/open-analysis.js';
import { createProgress } from '../shared/progress.js';
import { settleBand, settleHighestHarmonic } from '../shared/settings-band.js';
import { streamFrames } from '../shared/stream-frames.js';
import { channelGains } from './channel-gains.js';
import { integratedLoudness, loudnessOf, loudnessRange, slidingMeans } from './gate.js';
import { createKFilter } from './k-weighting.js';

/** How loud a programme is, how much that changes, how high its peaks go and whether they were cut off. */
export const loudnessMeasure: Measure = { id: 'loudness', title: 'Loudness', analyse: analyseLoudness };

/** Loudness is taken in steps of this: blocks of 400 ms overlap by three quarters then. */
const STEP_S = 0.1;
const MOMENTARY_STEPS = 4;
const SHORT_TERM_STEPS = 30;
/** Silence has no logarithm; nothing quieter is drawn. */
const TRACE_FLOOR_LUFS = -120;

async function analyseLoudness(
  source: SampleSource,
  settings: AnalysisSettings,
  context: AnalysisContext,
): Promise<BenchRecord> {
  const progress = createProgress(context.onProgress);
  const band = settleBand(settings, source.sampleRateHz, null);
  const { source: chosen, names } = selectByName(source, settings);
  const range = await settleSegment(chosen, settings, null, true, context, () => undefined);
  const { sampleFormat, bitsPerSample, sampleRateHz } = context.capture;
  const meters = names.map(() => ({
    filter: createKFilter(sampleRateHz),
    level: createLevelMeter(sampleFormat === 'integer' ? { integerBits: bitsPerSample } : {}),
    truePeak: createTruePeakMeter(sampleRateHz),
  }));
  const gains = channelGains(names.length);
  const steps: number[] = [];
  let [at, inStep] = [0, 0];
  await streamFrames(
    chosen,
    range,
    context,
    (channels) => {
      const { length } = channels[0];
      channels.forEach((samples, index) => {
        meters[index].level.push(samples);
        meters[index].truePeak.push(samples);
      });
      for (let from = 0; from < length;) {
        const end = Math.round((steps.length + 1) * STEP_S * sampleRateHz);
        const to = Math.min(length, from + end - at);
        channels.forEach((samples, index) => {
          inStep += gains[index] * meters[index].filter.sumOfSquares(samples, from, to);
        });
        at += to - from;
        from = to;
        if (at === end) {
          steps.push(inStep / (end - Math.round(steps.length * STEP_S * sampleRateHz)));
          inStep = 0;
        }
      }
    },
    progress,
  );
  const readings = meters.map(({ level, truePeak }) => {
    const reading = level.read();
    return { reading, truePeak: Math.max(truePeak.read(), reading.samplePeak) };
  });
  if (readings.length === 0) throw new DspInputError('EMPTY_SIGNAL', 'the recording has no channels');
  const momentary = slidingMeans(steps, MOMENTARY_STEPS);
  const shortTerm = slidingMeans(steps, SHORT_TERM_STEPS);
  const integrated = integratedLoudness(momentary);
  const peak = finiteDb(Math.max(...readings.map(({ truePeak }) => truePeak)));
  const runs = readings.reduce((sum, { reading }) => sum + reading.clippedRunCount, 0);
  return assembleRecord(source, settings, context, {
    measure: 'loudness',
    range,
    windowName: 'none',
    fftLength: 0,
    averages: 0,
    bandLowHz: band.lowHz,
    bandHighHz: band.highHz,
    highestHarmonic: settleHighestHarmonic(settings),
    reference: { unitFullScaleDbfs: null, from: null },
    stimulus: null,
    channels: names.map((channel, index) => ({
      channel,
      figures: {
        samplePeakDbfs: finiteDb(readings[index].reading.samplePeak),
        truePeakDbtp: finiteDb(readings[index].truePeak),
      },
      limits: {},
      uncertainty: {},
      harmonics: [],
      components: [],
      traces: {},
    })),
    between: {
      figures: {
        integratedLufs: integrated,
        loudnessRangeLu: loudnessRange(shortTerm),
        truePeakDbtp: peak,
        samplePeakDbfs: finiteDb(Math.max(...readings.map(({ reading }) => reading.samplePeak))),
        peakToLoudnessRatioDb: integrated === null || peak === null ? null : peak - integrated,
        clippedRunCount: runs,
      },
      traces: {
        shortTerm: {
          xUnit: 's',
          yUnit: 'LUFS',
          // A value stands at the end of the three seconds that it is of.
          x: Float64Array.from(shortTerm, (_, k) => (k + SHORT_TERM_STEPS) * STEP_S),
          y: shortTerm.map((value) => Math.max(TRACE_FLOOR_LUFS, loudnessOf(value))),
        },
      },
    },
    warnings: loudnessWarnings(integrated, steps.length, runs),
  });
}

function finiteDb(ratio: number): number | null {
  const db = ratioToDb(ratio);
  return Number.isFinite(db) ? db : null;
}

function loudnessWarnings(integrated: number | null, steps: number, runs: number): Warning[] {
  const warnings: Warning[] = [];
  if (steps < SHORT_TERM_STEPS) {
    const figures = steps < MOMENTARY_STEPS ? ['integratedLufs', 'loudnessRangeLu'] : ['loudnessRangeLu'];
    warnings.push(makeWarning('too-short-for-loudness', {}, { figures }));
  } else if (integrated === null) {
    warnings.push(
      makeWarning('too-quiet-for-loudness', {}, { figures: ['integratedLufs', 'loudnessRangeLu'] }),
    );
  }
  if (runs > 0) warnings.push(makeWarning('programme-clipped', { runs }, { figures: ['clippedRunCount'] }));
  return warnings;
}
