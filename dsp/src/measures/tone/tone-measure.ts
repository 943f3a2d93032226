import { meanSquareToDbfs, powerToDb } from '../../level/decibel.js';
import { makeWarning } from '../../record/make-warning.js';
import type { BenchRecord, FigureLimit, RecordBody } from '../../record/record.js';
import type { SampleSource } from '../../source/sample-source.js';
import type { AnalysisContext, AnalysisSettings, Measure } from '../measure.js';
import { assembleRecord } from '../shared/assemble-record.js';
import { matchBaseline, type BaselineMatch } from '../shared/find-baseline.js';
import {
  emptyChannel,
  finishChannel,
  type ChannelDraft,
  type FinishedChannel,
} from '../shared/finish-channel.js';
import { bareLimit } from '../shared/limits.js';
import { quantisationFloor } from '../shared/quantisation-floor.js';
import type { ChannelScan } from '../shared/scan-segment.js';
import { scanTones, stimulusMatch, type ToneScan } from '../shared/scan-tones.js';
import { settleBand, settleHighestHarmonic, type Band } from '../shared/settings-band.js';
import { spectrumTrace } from '../shared/spectrum-trace.js';
import type { StimulusKnowledge } from '../shared/stimulus-knowledge.js';
import { takeApart, type Distortion } from './distortion.js';
import { TONE_FIGURES, toneComponents, toneFigures, toneQuantisation, toneScales } from './tone-figures.js';
import { toneWarnings } from './tone-warnings.js';
import { waveTraces } from './wave-traces.js';

/** A single tone: its level and frequency, what is left beside it, harmonic by harmonic and over the wave. */
export const toneMeasure: Measure = { id: 'tone', title: 'Single tone', analyse: analyseTone };

interface TakenApart {
  readonly scan: ChannelScan;
  readonly parts: Distortion | null;
}

async function analyseTone(
  source: SampleSource,
  settings: AnalysisSettings,
  context: AnalysisContext,
): Promise<BenchRecord> {
  const highestHarmonic = settleHighestHarmonic(settings);
  settleBand(settings, source.sampleRateHz, null); // refuses a band that can't be before the work begins
  const scan = await scanTones(source, settings, context, { assumedStimulus: 'sine', preferred: null });
  const tones = scan.channels.map(({ tone }) => tone).filter((tone) => tone !== null);
  const band = settleBand(
    settings,
    source.sampleRateHz,
    Math.max(...tones.map(({ frequencyHz }) => frequencyHz)),
  );
  const channels = scan.channels.map((channel): TakenApart => ({
    scan: channel,
    parts: channel.tone === null ? null : takeApart(channel.spectrum, channel.tone, band, highestHarmonic),
  }));
  const first = channels.map(({ parts }) => parts).find((parts) => parts !== null) ?? null;
  const firstLevel = first === null ? null : meanSquareToDbfs(first.fundamental);
  const baseline = settings.baseline
    ? matchBaseline(settings.baseline, {
        measure: 'tone',
        sampleRateHz: source.sampleRateHz,
        bandLowHz: band.lowHz,
        bandHighHz: band.highHz,
        calibration: settings.calibration ?? null,
        levelDbfs: firstLevel,
        frequencyHz: first?.frequencyHz ?? null,
      })
    : null;
  const finished = channels.map((channel) => finishTone(channel, scan, band, settings, context, baseline));
  return assembleRecord(source, settings, context, {
    measure: 'tone',
    range: scan.range,
    windowName: scan.windowName,
    fftLength: scan.plan.fftLength,
    averages: scan.plan.starts.length,
    bandLowHz: band.lowHz,
    bandHighHz: band.highHz,
    highestHarmonic,
    reference: referenceFrom(scan.knowledge, firstLevel),
    stimulus: stimulusMatch(scan.knowledge, first?.frequencyHz ?? null),
    channels: finished.map(({ result }) => result),
    warnings: [
      ...scan.warnings,
      ...band.warnings,
      ...(baseline?.isApplicable === false
        ? [makeWarning('baseline-not-applicable', { reason: baseline.reason })]
        : []),
      ...finished.flatMap(({ warnings }) => warnings),
    ],
  });
}

/** Where the unit's own full scale lies in the recording: the tone's level less the level it was played at. */
function referenceFrom(knowledge: StimulusKnowledge, levelDbfs: number | null): RecordBody['reference'] {
  if (knowledge.levelDbfs === null || levelDbfs === null) return { unitFullScaleDbfs: null, from: null };
  return { unitFullScaleDbfs: levelDbfs - knowledge.levelDbfs, from: knowledge.recognisedBy };
}

function finishTone(
  { scan, parts }: TakenApart,
  whole: ToneScan,
  band: Band,
  settings: AnalysisSettings,
  context: AnalysisContext,
  baseline: BaselineMatch | null,
): FinishedChannel {
  if (scan.tone === null || parts === null) {
    return emptyChannel(
      scan.channel,
      TONE_FIGURES,
      scan.level.samplePeak === 0 ? 'channel-silent' : 'tone-missing',
    );
  }
  const figures = toneFigures(scan, parts);
  const draft: ChannelDraft = {
    scan,
    figures,
    components: toneComponents(parts, figures),
    scales: toneScales(parts),
    quantisationDb: toneQuantisation(parts, quantisationFloor(context.capture, scan.spectrum, band)),
    isTooShort: whole.isTooShort,
    ownLimits: boundedThd(parts),
    parts: {
      harmonics: parts.harmonics,
      components: [],
      traces: {
        spectrum: spectrumTrace(scan.spectrum),
        ...waveTraces(scan.tone, Math.sqrt(2 * parts.fundamental), scan.constant),
      },
    },
    warnings: toneWarnings(scan, scan.tone, parts, band, whole.knowledge.name === 'low-level-tone'),
  };
  return finishChannel(draft, settings, context, baseline);
}

/** THD that stands nowhere out of the noise is only bounded: by twice the scatter of every harmonic's place. */
function boundedThd(parts: Distortion): Record<string, FigureLimit> {
  if (parts.harmonicPower !== null || !(parts.harmonicBound > 0)) return {};
  const belowDb = powerToDb(parts.harmonicBound / parts.fundamental);
  return { thdDb: bareLimit('noise', belowDb), thdPercent: bareLimit('noise', 100 * 10 ** (belowDb / 20)) };
}
