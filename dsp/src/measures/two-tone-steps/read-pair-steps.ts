import type { CaptureFacts, SampleSource } from '../../source/sample-source.js';
import type { AnalysisContext } from '../measure.js';
import { isOverloaded } from '../shared/describe-recording.js';
import { createStepReader, type StepReader } from '../shared/steps/create-step-reader.js';
import type { PlacedStep } from '../shared/steps/place-steps.js';
import { throwIfCancelled } from '../shared/stream-frames.js';
import { lookForPairs, type PairSight } from '../shared/two-tone/look-for-pair.js';
import { pairKind } from '../shared/two-tone/pair-kind.js';
import { measureProducts, type PairProducts, type TonePair } from '../shared/two-tone/pair-products.js';

/** One step of one channel. */
export interface PairStep {
  readonly stimulusDbfs: number;
  readonly parts: PairProducts;
  readonly isOverloaded: boolean;
  readonly clippedRunCount: number;
}

export interface PairStepChannel {
  readonly pair: TonePair;
  readonly steps: readonly PairStep[];
}

export interface PairStepOptions {
  /** Both tones as they should lie in the recording; null for anywhere. */
  readonly nominal: { readonly lowHz: number; readonly highHz: number } | null;
  readonly amplitudeRatio: number | null;
  readonly highestHz: number;
}

/**
 * Reads the products of every step of every channel. The loudest step says where the tones lie.
 *
 * @returns one entry a channel; null for a channel without two tones
 */
export async function readPairSteps(
  source: SampleSource,
  steps: readonly PlacedStep[],
  { nominal, amplitudeRatio, highestHz }: PairStepOptions,
  context: Pick<AnalysisContext, 'signal'> & { readonly capture: CaptureFacts },
  onShare: (share: number) => void,
): Promise<(PairStepChannel | null)[]> {
  const reader = createStepReader(source.sampleRateHz, context.capture);
  const loudest = steps.reduce((one, other) => (other.levelDbfs > one.levelDbfs ? other : one));
  const sights = await lookForPairs(source, loudest.range, nominal);
  const block = await source.read(loudest.range.from, loudest.range.to - loudest.range.from);
  const pairs = sights.map((sight, channel) => refinePair(reader, block[channel], sight, amplitudeRatio));
  const found: PairStep[][] = pairs.map(() => []);
  for (const [done, { levelDbfs, range }] of steps.entries()) {
    throwIfCancelled(context);
    const channels = await source.read(range.from, range.to - range.from);
    channels.forEach((samples, channel) => {
      const pair = pairs[channel];
      if (pair === null) return;
      const { spectrum, level } = reader.read(samples, null);
      found[channel].push({
        stimulusDbfs: levelDbfs,
        parts: measureProducts(spectrum, pair, highestHz),
        isOverloaded: isOverloaded({ level, tone: { frequencyHz: pair.lowHz } }, context.capture),
        clippedRunCount: level.clippedRunCount,
      });
    });
    onShare((done + 1) / steps.length);
  }
  return pairs.map((pair, channel) => (pair === null ? null : { pair, steps: found[channel] }));
}

function refinePair(
  reader: StepReader,
  samples: Float64Array,
  sight: PairSight | null,
  amplitudeRatio: number | null,
): TonePair | null {
  if (sight === null) return null;
  const lowHz = reader.read(samples, sight.lowHz).tone?.frequencyHz;
  const highHz = reader.read(samples, sight.highHz).tone?.frequencyHz;
  if (lowHz === undefined || highHz === undefined) return null;
  return { lowHz, highHz, kind: pairKind(amplitudeRatio, lowHz, highHz) };
}
