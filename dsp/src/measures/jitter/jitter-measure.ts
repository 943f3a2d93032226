import { DspInputError } from '../../errors.js';
import { makeWarning } from '../../record/make-warning.js';
import type { BenchRecord } from '../../record/record.js';
import type { SampleSource } from '../../source/sample-source.js';
import type { AnalysisContext, AnalysisSettings, Measure } from '../measure.js';
import { alignStimulus, partNumber, type AlignedStimulus } from '../shared/align-stimulus.js';
import { assembleRecord } from '../shared/assemble-record.js';
import { combineAll } from '../shared/combine-all.js';
import { describeRecording } from '../shared/describe-recording.js';
import { emptyChannel, type FinishedChannel } from '../shared/finish-channel.js';
import { lookForTones } from '../shared/look-for-tone.js';
import { selectByName, settleSegment } from '../shared/open-analysis.js';
import { planFrames } from '../shared/plan-frames.js';
import { createProgress } from '../shared/progress.js';
import { scanSegment, type ChannelScan } from '../shared/scan-segment.js';
import { settleBand, settleHighestHarmonic } from '../shared/settings-band.js';
import { spectrumTrace } from '../shared/spectrum-trace.js';
import { cutWarnings } from '../shared/stimulus-knowledge.js';
import { findPairs } from './find-pairs.js';
import { closeInTrace, JITTER_FIGURES, jitterResult } from './jitter-figures.js';
import { patternLines, type PatternLines } from './pattern-lines.js';
import { readSidebands, type SidebandPair } from './read-sidebands.js';

/** A high tone and what stands close beside it: how unsteady the clock is. */
export const jitterMeasure: Measure = { id: 'jitter', title: 'Clock jitter', analyse: analyseJitter };

const WINDOW = 'blackman-harris-7';
const MARKS_SHARE = 0.3;
const SCAN_SHARE = 0.7;
const NEAR_NOMINAL = 0.01;
const USUAL_RATES_HZ = [44_100, 48_000, 88_200, 96_000, 176_400, 192_000];
/** Clocks a thousandth apart are no longer those of one nominal rate. */
const SAME_RATE = 1e-3;

async function analyseJitter(
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
    { measure: 'jitter', assumedName: 'jitter-test' },
    (share) => progress(share * MARKS_SHARE),
  );
  const range = await settleSegment(selected.source, settings, aligned.part, false, context, (share) =>
    progress(MARKS_SHARE + share * 0.1),
  );
  const nominalHz = nominalTone(aligned);
  const plan = planFrames(range.to - range.from);
  const preferred =
    nominalHz === null
      ? null
      : {
          lowHz: nominalHz * aligned.speed * (1 - NEAR_NOMINAL),
          highHz: nominalHz * aligned.speed * (1 + NEAR_NOMINAL),
        };
  const sights = await lookForTones(selected.source, range, plan, preferred);
  const scans = await scanSegment(
    selected.source,
    selected.names,
    range,
    { plan, windowName: WINDOW, searches: sights.map((sight) => sight?.search ?? null) },
    context,
    (share) => progress(MARKS_SHARE + 0.1 + share * (SCAN_SHARE - MARKS_SHARE - 0.1)),
  );
  if (scans.every(({ tone }) => tone === null)) {
    throw new DspInputError('NOTHING_MEASURABLE', 'the recording holds no steady tone to read a clock by', {
      remedy: 'Check that the jitter test was played bit for bit and recorded.',
    });
  }
  const pairs = await readSidebands(
    selected.source,
    range,
    plan,
    WINDOW,
    scans.map(({ spectrum, tone }) =>
      tone === null ? null : { toneHz: tone.frequencyHz, offsetsHz: findPairs(spectrum, tone.frequencyHz) },
    ),
    context,
  );
  progress(1);
  const own = ownLines(aligned);
  const finished = scans.map((scan, index) => finishJitter(scan, pairs[index], own, context));
  const firstHz = scans.find(({ tone }) => tone !== null)?.tone?.frequencyHz ?? null;
  return assembleRecord(source, settings, context, {
    measure: 'jitter',
    range,
    windowName: WINDOW,
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
      clockOffsetPpm: clockFrom(firstHz, nominalHz) ?? aligned.clockOffsetPpm,
      polarity: aligned.polarity,
    },
    channels: finished.map(({ result }) => result),
    warnings: [...cutWarnings(aligned, context), ...finished.flatMap(({ warnings }) => warnings)],
  });
}

/** The tone as played: a quarter of the player's rate; null where nothing says. */
function nominalTone({ parts, file, frequencyHz }: AlignedStimulus): number | null {
  const part = parts.at(0) ?? file?.parts.find(({ measure }) => measure === 'jitter');
  return (part === undefined ? null : partNumber(part, 'frequencyHz')) ?? frequencyHz;
}

/** Without anything that names it, a tone next to a quarter of a usual rate is taken for that quarter. */
function clockFrom(toneHz: number | null, nominalHz: number | null): number | null {
  if (toneHz === null) return null;
  const nominal =
    nominalHz ?? USUAL_RATES_HZ.map((rate) => rate / 4).find((hz) => Math.abs(toneHz / hz - 1) < SAME_RATE);
  return nominal === undefined ? null : (toneHz / nominal - 1) * 1e6;
}

/** The pattern's lines, of the bits that are known, else of both. */
function ownLines({ parts, file }: AlignedStimulus): PatternLines[] {
  const part = parts.at(0) ?? file?.parts.find(({ measure }) => measure === 'jitter');
  const bits = part === undefined ? null : partNumber(part, 'bits');
  return (bits === null ? [16, 24] : [bits]).map(patternLines);
}

function finishJitter(
  scan: ChannelScan,
  pairs: readonly SidebandPair[],
  own: readonly PatternLines[],
  context: AnalysisContext,
): FinishedChannel {
  const { channel, tone, spectrum } = scan;
  if (tone === null) {
    return emptyChannel(
      channel,
      JITTER_FIGURES,
      scan.level.samplePeak === 0 ? 'channel-silent' : 'tone-missing',
    );
  }
  const { figures, components, limits, uncertainty } = jitterResult(spectrum, tone.frequencyHz, pairs, own);
  const isBounded = figures['jitterPeakToPeakPs'] === null;
  return {
    result: {
      channel,
      figures,
      limits,
      uncertainty: combineAll(uncertainty),
      harmonics: [],
      components,
      traces: {
        spectrum: spectrumTrace(spectrum),
        closeIn: closeInTrace(spectrum, tone.frequencyHz),
      },
    },
    warnings: [
      ...describeRecording(scan, context.capture),
      ...(isBounded ? [makeWarning('no-sidebands', { channel }, { channel, figures: JITTER_FIGURES })] : []),
    ],
  };
}
