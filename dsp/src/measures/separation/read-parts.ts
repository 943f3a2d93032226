import type { SampleSource } from '../../source/sample-source.js';
import { sweepDurationS, type SweepSignal } from '../../stimulus/sweep-signal.js';
import {
  AFTER_SWEEP_S,
  BEFORE_SWEEP_S,
  createDeconvolver,
  type ImpulseResponse,
} from '../shared/deconvolution/create-deconvolver.js';

/** Where one channel's turn lies. */
export interface Turn {
  readonly sweep: SweepSignal;
  readonly fromS: number;
  readonly speed: number;
}

/** Responses of both channels while one was driven. */
export interface TurnResponses {
  readonly left: ImpulseResponse;
  readonly right: ImpulseResponse;
  readonly lowHz: number;
  readonly highHz: number;
}

/** Divides both channels of a turn by its sweep. */
export async function readTurn(source: SampleSource, turn: Turn): Promise<TurnResponses> {
  const { sampleRateHz, frameCount } = source;
  const { sweep, fromS, speed } = turn;
  const from = Math.min(frameCount, Math.max(0, Math.round((fromS - BEFORE_SWEEP_S) * sampleRateHz)));
  const endS = fromS + sweepDurationS(sweep) / speed + AFTER_SWEEP_S;
  const count = Math.max(0, Math.min(frameCount, Math.round(endS * sampleRateHz)) - from);
  const deconvolver = createDeconvolver({
    sweep,
    speed,
    sampleRateHz,
    leadS: fromS - from / sampleRateHz,
    frameCount: count,
  });
  const [left, right] = await source.read(from, count);
  return {
    left: deconvolver.deconvolve(left),
    right: deconvolver.deconvolve(right),
    lowHz: deconvolver.lowHz,
    highHz: deconvolver.highHz,
  };
}
