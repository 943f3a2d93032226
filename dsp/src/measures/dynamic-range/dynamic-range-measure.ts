import { meanSquareToDbfs, powerToDb } from '../../level/decibel.js';
import { makeWarning } from '../../record/make-warning.js';
import type { BenchRecord, Figures, Warning } from '../../record/record.js';
import type { SampleSource } from '../../source/sample-source.js';
import type { AnalysisContext, AnalysisSettings, Measure } from '../measure.js';
import { assembleRecord } from '../shared/assemble-record.js';
import type { BandNoise, NoiseReadings } from '../shared/band-noise.js';
import { inverseScale } from '../shared/figure-scale.js';
import { matchBaseline, type BaselineMatch } from '../shared/find-baseline.js';
import { emptyChannel, finishChannel, type FinishedChannel } from '../shared/finish-channel.js';
import { quantisationFloor, type QuantisationFloor } from '../shared/quantisation-floor.js';
import type { ChannelScan } from '../shared/scan-segment.js';
import { scanTones, stimulusMatch, type ToneScan } from '../shared/scan-tones.js';
import { settleBand, settleHighestHarmonic, shortLevel, type Band } from '../shared/settings-band.js';
import { spectrumTrace } from '../shared/spectrum-trace.js';
import { powerDeviationDb, type UncertaintyComponent } from '../shared/uncertainty.js';
import { takeApart, type Distortion } from '../tone/distortion.js';

/** How far the noise that a quiet tone leaves lies below the unit's full scale. */
export const dynamicRangeMeasure: Measure = {
  id: 'dynamic-range',
  title: 'Dynamic range',
  analyse: analyseDynamicRange,
};

/** @see AES17-2015, 6.4.1: dynamic range is measured with 997 Hz at -60 dB FS */
const STIMULUS_DBFS = -60;
const NEAR_STIMULUS = { lowHz: 900, highHz: 1100 };
/** A tone this loud was hardly played at -60 dBFS, whatever the gains in between. */
const SUSPICIOUS_DBFS = -35;

const READINGS = [
  ['dynamicRangeDb', 'flat'],
  ['dynamicRangeAWeightedDb', 'aWeighted'],
  ['dynamicRangeItu468RmsDb', 'itu468Rms'],
] as const satisfies readonly (readonly [string, keyof NoiseReadings])[];
const RANGE_FIGURES = READINGS.map(([key]) => key);
const DYNAMIC_RANGE_FIGURES = [...RANGE_FIGURES, 'fundamentalFrequencyHz', 'fundamentalLevelDbfs'];

async function analyseDynamicRange(
  source: SampleSource,
  settings: AnalysisSettings,
  context: AnalysisContext,
): Promise<BenchRecord> {
  const highestHarmonic = settleHighestHarmonic(settings);
  const band = settleBand(settings, source.sampleRateHz, null);
  const scan = await scanTones(source, settings, context, {
    assumedStimulus: 'low-level-tone',
    preferred: NEAR_STIMULUS,
  });
  const stimulusDbfs = scan.knowledge.levelDbfs ?? STIMULUS_DBFS;
  const channels = scan.channels.map((channel) => ({
    scan: channel,
    parts: channel.tone === null ? null : takeApart(channel.spectrum, channel.tone, band, highestHarmonic),
  }));
  const first = channels.map(({ parts }) => parts).find((parts) => parts !== null) ?? null;
  const levelDbfs = first === null ? null : meanSquareToDbfs(first.fundamental);
  const baseline = settings.baseline
    ? matchBaseline(settings.baseline, {
        measure: 'dynamic-range',
        sampleRateHz: source.sampleRateHz,
        bandLowHz: band.lowHz,
        bandHighHz: band.highHz,
        calibration: settings.calibration ?? null,
        levelDbfs,
        frequencyHz: first?.frequencyHz ?? null,
      })
    : null;
  const finished = channels.map(({ scan: channel, parts }) =>
    finishRange(channel, parts, stimulusDbfs, { scan, band, settings, context, baseline }),
  );
  return assembleRecord(source, settings, context, {
    measure: 'dynamic-range',
    range: scan.range,
    windowName: scan.windowName,
    fftLength: scan.plan.fftLength,
    averages: scan.plan.starts.length,
    bandLowHz: band.lowHz,
    bandHighHz: band.highHz,
    highestHarmonic,
    reference: {
      unitFullScaleDbfs: levelDbfs === null ? null : levelDbfs - stimulusDbfs,
      from: scan.knowledge.levelDbfs === null ? 'assumed' : scan.knowledge.recognisedBy,
    },
    stimulus: stimulusMatch(scan.knowledge, first?.frequencyHz ?? null),
    channels: finished.map(({ result }) => result),
    warnings: [
      ...scan.warnings,
      ...band.warnings,
      ...levelWarnings(scan.knowledge.levelDbfs, levelDbfs),
      ...(baseline?.isApplicable === false
        ? [makeWarning('baseline-not-applicable', { reason: baseline.reason })]
        : []),
      ...finished.flatMap(({ warnings }) => warnings),
    ],
  });
}

function levelWarnings(knownDbfs: number | null, levelDbfs: number | null): Warning[] {
  if (knownDbfs !== null || levelDbfs === null) return [];
  if (levelDbfs <= SUSPICIOUS_DBFS) return [makeWarning('level-assumed', {}, { figures: RANGE_FIGURES })];
  return [makeWarning('level-unexpected', { level: shortLevel(levelDbfs) }, { figures: RANGE_FIGURES })];
}

interface RangeContext {
  readonly scan: ToneScan;
  readonly band: Band;
  readonly settings: AnalysisSettings;
  readonly context: AnalysisContext;
  readonly baseline: BaselineMatch | null;
}

function finishRange(
  scan: ChannelScan,
  parts: Distortion | null,
  stimulusDbfs: number,
  whole: RangeContext,
): FinishedChannel {
  if (parts === null) {
    return emptyChannel(
      scan.channel,
      DYNAMIC_RANGE_FIGURES,
      scan.level.samplePeak === 0 ? 'channel-silent' : 'tone-missing',
    );
  }
  const { settings, context, band, baseline } = whole;
  const fullScaleDbfs = meanSquareToDbfs(parts.fundamental) - stimulusDbfs;
  const level = powerDeviationDb(parts.fundamental, parts.fundamentalVariance);
  const components: Record<string, readonly UncertaintyComponent[]> = {
    fundamentalFrequencyHz: [{ name: 'fit', value: parts.frequencyDeviationHz }],
    fundamentalLevelDbfs: [{ name: 'estimate', value: level }],
  };
  for (const [key, reading] of READINGS) {
    const { meanSquare, variance } = parts.residualReadings[reading];
    components[key] = [
      { name: 'estimate', value: powerDeviationDb(meanSquare, variance) },
      { name: 'level', value: level },
    ];
  }
  const isEmpty = parts.residual.meanSquare === 0;
  const warnings = isEmpty
    ? [
        makeWarning(
          'nothing-left',
          { channel: scan.channel },
          { channel: scan.channel, figures: RANGE_FIGURES },
        ),
      ]
    : [];
  return finishChannel(
    {
      scan,
      figures: rangeFigures(parts, fullScaleDbfs),
      components,
      scales: RANGE_FIGURES.map((key) => inverseScale(key, 'noise')),
      quantisationDb: rangeQuantisation(
        quantisationFloor(context.capture, scan.spectrum, band),
        fullScaleDbfs,
      ),
      isTooShort: whole.scan.isTooShort,
      ownLimits: {},
      parts: {
        harmonics: parts.harmonics,
        components: [],
        traces: { spectrum: spectrumTrace(scan.spectrum) },
      },
      warnings,
    },
    settings,
    context,
    baseline,
  );
}

function rangeFigures(parts: Distortion, fullScaleDbfs: number): Figures {
  const range = ({ meanSquare }: BandNoise): number | null =>
    meanSquare > 0 ? fullScaleDbfs - meanSquareToDbfs(meanSquare) : null;
  return {
    ...Object.fromEntries(READINGS.map(([key, reading]) => [key, range(parts.residualReadings[reading])])),
    fundamentalFrequencyHz: parts.frequencyHz,
    fundamentalLevelDbfs: meanSquareToDbfs(parts.fundamental),
  };
}

function rangeQuantisation(floor: QuantisationFloor | null, fullScaleDbfs: number): Record<string, number> {
  if (floor === null) return {};
  return Object.fromEntries(
    READINGS.map(([key, reading]) => [key, powerToDb(2 * floor[reading]) - fullScaleDbfs]),
  );
}
