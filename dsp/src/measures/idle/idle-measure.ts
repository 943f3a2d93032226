import { DspInputError } from '../../errors.js';
import { meanSquareToDbfs, ratioToDb } from '../../level/decibel.js';
import { makeWarning } from '../../record/make-warning.js';
import type { BenchRecord, Figures, StimulusMatch, Warning } from '../../record/record.js';
import type { SampleSource } from '../../source/sample-source.js';
import type { AnalysisContext, AnalysisSettings, Measure } from '../measure.js';
import { assembleRecord } from '../shared/assemble-record.js';
import { readNoise, type NoiseReadings } from '../shared/band-noise.js';
import { levelScale } from '../shared/figure-scale.js';
import { matchBaseline, type BaselineMatch } from '../shared/find-baseline.js';
import { findMains, resolvesMains, type MainsHum } from '../shared/find-mains.js';
import { findSpurs } from '../shared/find-spurs.js';
import { emptyChannel, finishChannel, type FinishedChannel } from '../shared/finish-channel.js';
import { selectByName, settleSegment } from '../shared/open-analysis.js';
import { planFrames } from '../shared/plan-frames.js';
import { createProgress } from '../shared/progress.js';
import { quantisationFloor } from '../shared/quantisation-floor.js';
import { stimulusMatch } from '../shared/scan-tones.js';
import { scanSegment, type ChannelScan } from '../shared/scan-segment.js';
import {
  settleBand,
  settleHighestHarmonic,
  shortLevel,
  shortNumber,
  type Band,
} from '../shared/settings-band.js';
import { spectrumTrace } from '../shared/spectrum-trace.js';
import { powerDeviationDb } from '../shared/uncertainty.js';
import { removeLobes } from '../../spectrum/remove-lobes.js';
import { classifySpurs } from './classify-spurs.js';

/** A recording without signal: its noise, its hum, and the lines that stand in it. */
export const idleMeasure: Measure = { id: 'idle', title: 'Idle noise', analyse: analyseIdle };

const IDLE_FIGURES = [
  'noiseDbfs',
  'noiseAWeightedDbfs',
  'noiseItu468RmsDbfs',
  'samplePeakDbfs',
  'dcOffsetDbfs',
  'mainsFrequencyHz',
  'humDbfs',
];
const HUM_FIGURES = ['mainsFrequencyHz', 'humDbfs'];
const WINDOW = 'blackman-harris-7';
/** A line louder than this is a signal that somebody plays. */
const SIGNAL_DBFS = -50;
/** Seconds that part 50 from 60 Hz at any rate, under the window used. */
const WANTED_S = 1.4;

async function analyseIdle(
  source: SampleSource,
  settings: AnalysisSettings,
  context: AnalysisContext,
): Promise<BenchRecord> {
  const progress = createProgress(context.onProgress);
  const highestHarmonic = settleHighestHarmonic(settings);
  const band = settleBand(settings, source.sampleRateHz, null);
  const selected = selectByName(source, settings);
  const range = await settleSegment(
    selected.source,
    settings,
    context.placed?.part ?? null,
    true,
    context,
    progress,
  );
  const plan = planFrames(range.to - range.from);
  const options = { plan, windowName: WINDOW, searches: selected.names.map(() => null) } as const;
  const scans = await scanSegment(selected.source, selected.names, range, options, context, progress);
  const baseline = settings.baseline
    ? matchBaseline(settings.baseline, {
        measure: 'idle',
        sampleRateHz: source.sampleRateHz,
        bandLowHz: band.lowHz,
        bandHighHz: band.highHz,
        calibration: settings.calibration ?? null,
        levelDbfs: null,
        frequencyHz: null,
      })
    : null;
  const finished = scans.map((scan) => finishIdle(scan, band, settings, context, baseline));
  if (finished.length === 0) throw new DspInputError('EMPTY_SIGNAL', 'the recording has no channels');
  return assembleRecord(source, settings, context, {
    measure: 'idle',
    range,
    windowName: WINDOW,
    fftLength: plan.fftLength,
    averages: plan.starts.length,
    bandLowHz: band.lowHz,
    bandHighHz: band.highHz,
    highestHarmonic,
    reference: { unitFullScaleDbfs: null, from: null },
    stimulus: silenceMatch(context),
    channels: finished.map(({ result }) => result),
    warnings: [
      ...band.warnings,
      ...(baseline?.isApplicable === false
        ? [makeWarning('baseline-not-applicable', { reason: baseline.reason })]
        : []),
      ...finished.flatMap(({ warnings }) => warnings),
    ],
  });
}

/** Silence has no marks of its own: only a descriptor or a programme can name it. */
function silenceMatch({ descriptor, placed }: AnalysisContext): StimulusMatch {
  if (placed) return stimulusMatch(placed, null);
  return {
    name: descriptor?.name ?? 'silence',
    recognisedBy: descriptor ? 'descriptor' : 'signal',
    delayS: null,
    clockOffsetPpm: null,
    polarity: null,
  };
}

function finishIdle(
  scan: ChannelScan,
  band: Band,
  settings: AnalysisSettings,
  context: AnalysisContext,
  baseline: BaselineMatch | null,
): FinishedChannel {
  const { spectrum, channel } = scan;
  if (scan.level.samplePeak === 0) return emptyChannel(channel, IDLE_FIGURES, 'digital-silence');
  // The constant's lobe is refilled: in a short record it would reach into the band.
  const noise = readNoise(spectrum, removeLobes(spectrum, []).power, band);
  const spurs = findSpurs(spectrum, band);
  const mains = findMains(spectrum, spurs);
  const components = classifySpurs(spectrum, spurs, mains);
  const floor = quantisationFloor(context.capture, spectrum, band);
  const humDeviation = mains === null ? Number.NaN : powerDeviationDb(mains.meanSquare, mains.variance);
  return finishChannel(
    {
      scan,
      figures: idleFigures(scan, noise, mains),
      components: {
        noiseDbfs: [
          { name: 'estimate', value: powerDeviationDb(noise.flat.meanSquare, noise.flat.variance) },
        ],
        noiseAWeightedDbfs: [
          { name: 'estimate', value: powerDeviationDb(noise.aWeighted.meanSquare, noise.aWeighted.variance) },
        ],
        noiseItu468RmsDbfs: [
          { name: 'estimate', value: powerDeviationDb(noise.itu468Rms.meanSquare, noise.itu468Rms.variance) },
        ],
        humDbfs: [{ name: 'estimate', value: humDeviation }],
      },
      scales: [
        levelScale('noiseDbfs', 'noise'),
        levelScale('noiseAWeightedDbfs', 'noise'),
        levelScale('noiseItu468RmsDbfs', 'noise'),
        levelScale('humDbfs', 'product'),
      ],
      quantisationDb:
        floor === null
          ? {}
          : {
              noiseDbfs: meanSquareToDbfs(floor.flat),
              noiseAWeightedDbfs: meanSquareToDbfs(floor.aWeighted),
              noiseItu468RmsDbfs: meanSquareToDbfs(floor.itu468Rms),
            },
      isTooShort: false,
      ownLimits: {},
      parts: { harmonics: [], components, traces: { spectrum: spectrumTrace(spectrum) } },
      warnings: idleWarnings(scan, mains, components[0], noise),
    },
    settings,
    context,
    baseline,
  );
}

function idleFigures(scan: ChannelScan, noise: NoiseReadings, mains: MainsHum | null): Figures {
  const level = (meanSquare: number): number | null => (meanSquare > 0 ? meanSquareToDbfs(meanSquare) : null);
  const offset = Math.abs(scan.constant);
  return {
    noiseDbfs: level(noise.flat.meanSquare),
    noiseAWeightedDbfs: level(noise.aWeighted.meanSquare),
    noiseItu468RmsDbfs: level(noise.itu468Rms.meanSquare),
    samplePeakDbfs: ratioToDb(scan.level.samplePeak),
    dcOffsetDbfs: offset > 0 ? ratioToDb(offset) : null,
    mainsFrequencyHz: mains?.frequencyHz ?? null,
    humDbfs: mains === null ? null : meanSquareToDbfs(mains.meanSquare),
  };
}

function idleWarnings(
  scan: ChannelScan,
  mains: MainsHum | null,
  strongest: Readonly<Record<string, number | string | null>> | undefined,
  noise: NoiseReadings,
): Warning[] {
  const { channel, spectrum } = scan;
  const warnings: Warning[] = [];
  if (!resolvesMains(spectrum)) {
    const duration = shortNumber(scan.level.count / spectrum.sampleRateHz);
    warnings.push(
      makeWarning('hum-unresolved', { duration, wanted: WANTED_S }, { channel, figures: HUM_FIGURES }),
    );
  } else if (mains === null) {
    warnings.push(makeWarning('no-hum', {}, { channel, figures: HUM_FIGURES }));
  }
  const { frequencyHz, levelDbfs } = strongest ?? {};
  if (typeof frequencyHz === 'number' && typeof levelDbfs === 'number' && levelDbfs > SIGNAL_DBFS) {
    const values = { frequency: shortNumber(frequencyHz), level: shortLevel(levelDbfs) };
    warnings.push(makeWarning('signal-present', values, { channel, figures: ['noiseDbfs'] }));
  }
  if (noise.flat.meanSquare === 0)
    warnings.push(makeWarning('nothing-left', { channel }, { channel, figures: ['noiseDbfs'] }));
  return warnings;
}
