import { DspInputError } from '../../errors.js';
import { makeWarning } from '../../record/make-warning.js';
import type { BenchRecord } from '../../record/record.js';
import type { SampleSource } from '../../source/sample-source.js';
import type { AnalysisContext, AnalysisSettings, Measure } from '../measure.js';
import { alignStimulus, type AlignedStimulus } from '../shared/align-stimulus.js';
import { assembleRecord } from '../shared/assemble-record.js';
import { emptyChannel, finishChannel, type FinishedChannel } from '../shared/finish-channel.js';
import { selectByName, settleSegment } from '../shared/open-analysis.js';
import { planFrames, type FramePlan } from '../shared/plan-frames.js';
import { createProgress } from '../shared/progress.js';
import { scanSegment, type ChannelScan } from '../shared/scan-segment.js';
import { stimulusMatch } from '../shared/scan-tones.js';
import { settleBand, settleHighestHarmonic, type Band } from '../shared/settings-band.js';
import { cutWarnings } from '../shared/stimulus-knowledge.js';
import { FILTER_FIGURES, filterFigures } from './filter-figures.js';
import { readNoiseResponse } from './noise-response.js';
import { guessPlayerRate } from './player-rate.js';

/** What white noise shows of a player's reconstruction filter: its pass band, its edge, and what it leaves of images. */
export const filterMeasure: Measure = { id: 'filter', title: 'Filter', analyse: analyseFilter };

const WINDOW = 'blackman-harris-7';
const MARKS_SHARE = 0.4;
/** Lines this far apart at most part the lowest bands, and leave many averages. */
const LINE_HZ = 6;
/** Share of the lower rate up to which a response counts. */
const USABLE_SHARE = 0.45;
/** No line of white noise holds this share of its power. */
const LINE_SHARE = 0.1;

async function analyseFilter(
  source: SampleSource,
  settings: AnalysisSettings,
  context: AnalysisContext,
): Promise<BenchRecord> {
  const progress = createProgress(context.onProgress);
  const band = settleBand(settings, source.sampleRateHz, null);
  const highestHarmonic = settleHighestHarmonic(settings);
  const selected = selectByName(source, settings);
  const aligned = await alignStimulus(
    source,
    context,
    { measure: 'filter', assumedName: 'white-noise' },
    (share) => progress(share * MARKS_SHARE),
  );
  const range = await settleSegment(selected.source, settings, aligned.part, false, context, (share) =>
    progress(MARKS_SHARE * (1 + share / 2)),
  );
  const plan = planNoise(range.to - range.from, source.sampleRateHz);
  const searches = selected.names.map(() => null);
  const scans = await scanSegment(
    selected.source,
    selected.names,
    range,
    { plan, windowName: WINDOW, searches },
    context,
    (share) => progress(0.6 + 0.4 * share),
  );
  const playerRateHz = playerRate(aligned, scans);
  const finished = scans.map((scan) => finishFilter(scan, playerRateHz, band, settings, context));
  if (finished.every(({ result }) => FILTER_FIGURES.every((key) => result.figures[key] === null))) {
    throw new DspInputError('NOTHING_MEASURABLE', 'no channel holds noise', {
      remedy: 'Check the cables and that the right file was recorded.',
    });
  }
  return assembleRecord(source, settings, context, {
    measure: 'filter',
    range,
    windowName: WINDOW,
    fftLength: plan.fftLength,
    averages: plan.starts.length,
    bandLowHz: band.lowHz,
    bandHighHz: band.highHz,
    highestHarmonic,
    reference: { unitFullScaleDbfs: null, from: null },
    stimulus: stimulusMatch(aligned, null),
    channels: finished.map(({ result }) => result),
    warnings: [
      ...cutWarnings(aligned, context),
      ...band.warnings,
      ...finished.flatMap(({ warnings }) => warnings),
    ],
  });
}

/** Frames short enough for many averages, overlapping by three quarters. */
function planNoise(frameCount: number, sampleRateHz: number): FramePlan {
  const wanted = 2 ** Math.ceil(Math.log2(sampleRateHz / LINE_HZ));
  const longest = planFrames(frameCount).fftLength;
  const fftLength = Math.min(wanted, longest);
  const rest = frameCount - fftLength;
  const gaps = Math.ceil(rest / (fftLength / 4));
  const starts = Array.from({ length: gaps + 1 }, (_, m) => (gaps === 0 ? 0 : Math.round((m * rest) / gaps)));
  return { fftLength, starts };
}

/** From the descriptor or the marks; without either, where the noise ends tells. */
function playerRate(aligned: AlignedStimulus, scans: readonly ChannelScan[]): number | null {
  if (aligned.file !== null) return aligned.file.sampleRateHz * aligned.speed;
  const loudest = scans.reduce((one, other) => (other.level.meanSquare > one.level.meanSquare ? other : one));
  return loudest.level.meanSquare > 0 ? guessPlayerRate(loudest.spectrum) : null;
}

function finishFilter(
  scan: ChannelScan,
  playerRateHz: number | null,
  band: Band,
  settings: AnalysisSettings,
  context: AnalysisContext,
): FinishedChannel {
  const { channel, spectrum, level } = scan;
  if (level.samplePeak === 0) return emptyChannel(channel, FILTER_FIGURES, 'channel-silent');
  const traceHighHz = USABLE_SHARE * spectrum.sampleRateHz;
  const lowHz = Math.max(band.lowHz, spectrum.binWidthHz);
  const response = isNoise(scan) ? readNoiseResponse(spectrum, lowHz, traceHighHz) : null;
  if (response === null) {
    const { result } = emptyChannel(channel, FILTER_FIGURES, 'channel-silent');
    return {
      result,
      warnings: [makeWarning('noise-missing', { channel }, { channel, figures: FILTER_FIGURES })],
    };
  }
  const usableHz = USABLE_SHARE * Math.min(spectrum.sampleRateHz, playerRateHz ?? Infinity);
  const { figures, components, ownLimits, warnings } = filterFigures({
    channel,
    spectrum,
    response,
    band: { lowHz, highHz: Math.min(band.highHz, usableHz) },
    playerRateHz,
  });
  const { x, y } = response;
  return finishChannel(
    {
      scan,
      figures,
      components,
      scales: [],
      quantisationDb: {},
      isTooShort: false,
      ownLimits,
      parts: { harmonics: [], components: [], traces: { response: { xUnit: 'Hz', yUnit: 'dB', x, y } } },
      warnings,
    },
    settings,
    context,
    null,
  );
}

/** Tones and music have lines that stand out of all the rest. */
function isNoise({ spectrum }: ChannelScan): boolean {
  const total = spectrum.power.reduce((sum, value) => sum + value, 0);
  const greatest = spectrum.power.reduce((most, value) => Math.max(most, value), 0);
  return total > 0 && greatest < LINE_SHARE * total;
}
