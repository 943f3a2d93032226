import { DspInputError } from '../../errors.js';
import type { SampleSource } from '../../source/sample-source.js';
import type { AnalysisContext } from '../measure.js';

/** Frames read at once: small beside the spectra, large enough that a read costs little. */
const BLOCK_FRAMES = 65_536;

/** Part of a source, frames counted from its first; `to` is the first one left out. */
export interface FrameRange {
  readonly from: number;
  readonly to: number;
}

/** Throws `CANCELLED` once the caller has given up. */
export function throwIfCancelled(context: Pick<AnalysisContext, 'signal'>): void {
  if (context.signal?.aborted === true) throw new DspInputError('CANCELLED', 'the analysis was cancelled');
}

/**
 * Reads a range of a source block by block.
 *
 * @param onBlock - told each block, one array a channel
 * @param onShare - told the share of the range that has been read, ascending to 1
 * @throws DspInputError `CANCELLED` between blocks; whatever reading throws
 */
export async function streamFrames(
  source: SampleSource,
  range: FrameRange,
  context: Pick<AnalysisContext, 'signal'>,
  onBlock: (channels: readonly Float64Array[]) => void,
  onShare: (share: number) => void = () => undefined,
): Promise<void> {
  let at = range.from;
  while (at < range.to) {
    throwIfCancelled(context);
    const block = await source.read(at, Math.min(BLOCK_FRAMES, range.to - at));
    const count = block[0]?.length ?? 0;
    if (count === 0) break;
    onBlock(block);
    at += count;
    onShare((at - range.from) / (range.to - range.from));
  }
}
