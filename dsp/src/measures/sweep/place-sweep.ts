import { DspInputError } from '../../errors.js';
import { makeWarning } from '../../record/make-warning.js';
import type { Warning } from '../../record/record.js';
import type { SampleSource } from '../../source/sample-source.js';
import { findStrongestChannel } from '../../stimulus/marks/strongest-channel.js';
import type { SweepSignal } from '../../stimulus/sweep-signal.js';
import type { AnalysisContext } from '../measure.js';
import type { AlignedStimulus } from '../shared/align-stimulus.js';
import { sweepOfPart } from '../shared/deconvolution/sweep-of-part.js';
import { locateSweep, recogniseSweep, refineSweep } from './locate-sweep.js';

/** A sweep and where it lies in the recording. */
export interface PlacedSweep {
  readonly sweep: SweepSignal;
  readonly fromS: number;
  readonly speed: number;
  /** The clock is known, so that phases mean something. */
  readonly isClockKnown: boolean;
  readonly isAssumed: boolean;
  readonly warnings: readonly Warning[];
}

/**
 * Says where the sweep lies: by the marks, else by looking for the described sweep, else by a tone that rises as one.
 *
 * @throws DspInputError `NOT_RECOGNISED` when the recording holds no sweep
 */
export async function placeSweep(
  source: SampleSource,
  aligned: AlignedStimulus,
  context: Pick<AnalysisContext, 'signal'>,
): Promise<PlacedSweep> {
  const part = aligned.parts.find(({ measure }) => measure === 'sweep');
  const known = part === undefined ? null : sweepOfPart(part);
  if (part !== undefined && known !== null) {
    return {
      sweep: known,
      fromS: part.fromS,
      speed: aligned.speed,
      isClockKnown: aligned.clockOffsetPpm !== null,
      isAssumed: false,
      warnings: [],
    };
  }
  const channel = await findStrongestChannel(source);
  const described = aligned.file?.parts.find(({ measure }) => measure === 'sweep');
  const sweep =
    (described === undefined ? null : sweepOfPart(described)) ??
    (await recogniseSweep(source, channel, context));
  const located = sweep === null ? null : await locateSweep(source, channel, sweep);
  if (located === null) {
    throw new DspInputError('NOT_RECOGNISED', 'the recording holds no sweep that could be found', {
      remedy: 'Give the stimulus’s descriptor, or record the file with its marks.',
    });
  }
  const isAssumed = described === undefined;
  const refined = await refineSweep(source, channel, located);
  return {
    ...refined,
    isAssumed,
    warnings: isAssumed ? [makeWarning('stimulus-assumed', { name: 'sweep' })] : [],
  };
}
