import { DspInputError } from '../../errors.js';
import { meanSquareToDbfs } from '../../level/decibel.js';
import { makeWarning } from '../../record/make-warning.js';
import type { BenchRecord } from '../../record/record.js';
import type { SampleSource } from '../../source/sample-source.js';
import type { AnalysisContext, AnalysisSettings, Measure } from '../measure.js';
import { alignStimulus, partNumber, type AlignedStimulus } from '../shared/align-stimulus.js';
import { assembleRecord } from '../shared/assemble-record.js';
import { matchBaseline, type BaselineMatch } from '../shared/find-baseline.js';
import { emptyChannel, finishChannel, type FinishedChannel } from '../shared/finish-channel.js';
import { selectByName, settleSegment } from '../shared/open-analysis.js';
import { planFrames } from '../shared/plan-frames.js';
import { createProgress } from '../shared/progress.js';
import { scanSegment, type ChannelScan } from '../shared/scan-segment.js';
import { settleBand, settleHighestHarmonic } from '../shared/settings-band.js';
import { spectrumTrace } from '../shared/spectrum-trace.js';
import { cutWarnings } from '../shared/stimulus-knowledge.js';
import { lookForPairs } from '../shared/two-tone/look-for-pair.js';
import { highestProductHz, pairKind } from '../shared/two-tone/pair-kind.js';
import { measureProducts, type PairProducts, type TonePair } from '../shared/two-tone/pair-products.js';
import {
  PAIR_FIGURES,
  pairComponents,
  pairComponentsList,
  pairFigures,
  pairLimits,
  pairScales,
} from './two-tone-figures.js';

/** Two tones at once: what they make of each other. */
export const twoToneMeasure: Measure = { id: 'two-tone', title: 'Two tones', analyse: analyseTwoTone };

const WINDOW = 'blackman-harris-7';
const MARKS_SHARE = 0.3;
const SURVEY_SHARE = 0.4;

interface PairResult {
  readonly scan: ChannelScan;
  readonly found: { readonly pair: TonePair; readonly parts: PairProducts } | null;
}

async function analyseTwoTone(
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
    { measure: 'two-tone', assumedName: 'two-tone' },
    (share) => progress(share * MARKS_SHARE),
  );
  const range = await settleSegment(selected.source, settings, aligned.part, false, context, (share) =>
    progress(MARKS_SHARE + share * (SURVEY_SHARE - MARKS_SHARE)),
  );
  const known = knownPair(aligned);
  const sights = await lookForPairs(selected.source, range, known);
  if (sights.every((sight) => sight === null)) {
    throw new DspInputError(
      'NOTHING_MEASURABLE',
      'the recording holds no two tones that stand out of its noise',
      {
        remedy: 'Check that the right file was recorded, or measure it as a single tone.',
      },
    );
  }
  const plan = planFrames(range.to - range.from);
  const scans = await scanSegment(
    selected.source,
    selected.names,
    range,
    {
      plan,
      windowName: WINDOW,
      searches: sights.map((sight) => sight?.high ?? null),
      lowSearches: sights.map((sight) => sight?.low ?? null),
    },
    context,
    (share) => progress(SURVEY_SHARE + share * (1 - SURVEY_SHARE)),
  );
  const highestHz = highestProductHz(source.sampleRateHz, aligned.file?.sampleRateHz ?? null);
  const results = scans.map((scan) => takePairApart(scan, known?.amplitudeRatio ?? null, highestHz));
  const first = results.find(({ found }) => found !== null)?.found ?? null;
  const baseline = settings.baseline
    ? matchBaseline(settings.baseline, {
        measure: 'two-tone',
        sampleRateHz: source.sampleRateHz,
        bandLowHz: band.lowHz,
        bandHighHz: band.highHz,
        calibration: settings.calibration ?? null,
        levelDbfs: first === null ? null : meanSquareToDbfs(first.parts.highPower),
        frequencyHz: first?.pair.highHz ?? null,
      })
    : null;
  const kind = first?.pair.kind ?? 'difference';
  const finished = results.map((result) => finishPair(result, kind, settings, context, baseline));
  return assembleRecord(source, settings, context, {
    measure: 'two-tone',
    range,
    windowName: WINDOW,
    fftLength: plan.fftLength,
    averages: plan.starts.length,
    bandLowHz: band.lowHz,
    bandHighHz: band.highHz,
    highestHarmonic: settleHighestHarmonic(settings),
    reference: { unitFullScaleDbfs: null, from: null },
    stimulus: {
      name: aligned.name === 'two-tone' ? `${kind}-pair` : aligned.name,
      recognisedBy: aligned.recognisedBy,
      delayS: aligned.delayS,
      clockOffsetPpm: clockFrom(first?.pair ?? null, known) ?? aligned.clockOffsetPpm,
      polarity: aligned.polarity,
    },
    channels: finished.map(({ result }) => result),
    warnings: [
      ...cutWarnings(aligned, context),
      ...(baseline?.isApplicable === false
        ? [makeWarning('baseline-not-applicable', { reason: baseline.reason })]
        : []),
      ...finished.flatMap(({ warnings }) => warnings),
    ],
  });
}

interface KnownPair {
  /** As they should lie in the recording. */
  readonly lowHz: number;
  readonly highHz: number;
  readonly nominalHighHz: number;
  readonly amplitudeRatio: number | null;
}

/** What descriptor or marks say of the tones; null where nothing does. */
function knownPair({ parts, file, speed }: AlignedStimulus): KnownPair | null {
  const part = parts.at(0) ?? file?.parts.find(({ measure }) => measure === 'two-tone');
  if (part === undefined) return null;
  const low = partNumber(part, 'lowFrequencyHz');
  const high = partNumber(part, 'highFrequencyHz');
  if (low === null || high === null) return null;
  return {
    lowHz: low * speed,
    highHz: high * speed,
    nominalHighHz: high,
    amplitudeRatio: partNumber(part, 'amplitudeRatio'),
  };
}

/** A tone tells the clocks' offset better than the few milliseconds between marks. */
function clockFrom(pair: TonePair | null, known: KnownPair | null): number | null {
  return pair === null || known === null ? null : (pair.highHz / known.nominalHighHz - 1) * 1e6;
}

function takePairApart(scan: ChannelScan, amplitudeRatio: number | null, highestHz: number): PairResult {
  const { tone, lowTone } = scan;
  if (tone === null || lowTone === null) return { scan, found: null };
  const [lowHz, highHz] = [lowTone.frequencyHz, tone.frequencyHz];
  const pair = { lowHz, highHz, kind: pairKind(amplitudeRatio, lowHz, highHz) };
  return { scan, found: { pair, parts: measureProducts(scan.spectrum, pair, highestHz) } };
}

function finishPair(
  { scan, found }: PairResult,
  kind: TonePair['kind'],
  settings: AnalysisSettings,
  context: AnalysisContext,
  baseline: BaselineMatch | null,
): FinishedChannel {
  const { channel } = scan;
  if (found === null) {
    const code = scan.level.samplePeak === 0 ? 'channel-silent' : 'tone-missing';
    return emptyChannel(channel, PAIR_FIGURES[kind], code);
  }
  const { pair, parts } = found;
  const bounded = Object.keys(pairLimits(pair.kind, parts));
  return finishChannel(
    {
      scan,
      figures: pairFigures(pair, parts),
      components: pairComponents(pair.kind, parts),
      scales: pairScales(pair.kind, parts),
      quantisationDb: {},
      isTooShort: false,
      ownLimits: pairLimits(pair.kind, parts),
      parts: {
        harmonics: [],
        components: pairComponentsList(pair, parts),
        traces: { spectrum: spectrumTrace(scan.spectrum) },
      },
      warnings:
        bounded.length > 0
          ? [makeWarning('products-in-noise', { channel }, { channel, figures: bounded })]
          : [],
    },
    settings,
    context,
    baseline,
  );
}
