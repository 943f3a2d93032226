import { createGaussian } from '../../random/create-gaussian.js';
import type { Random } from '../../random/create-random.js';
import type { ClockStage, DelayStage, JitterStage } from '../device.js';
import { createKernel, KERNEL_REACH, type Kernel } from './interpolate.js';
import { createSine } from './oscillator.js';

const SECONDS_PER_PS = 1e-12;
/** Room for a clock that runs ahead; beyond it the stream begins anew at its middle. */
const CLOCK_ROOM_FRAMES = 8192;

/** Reads a stream between its frames, a fixed latency behind. */
export interface StreamRetimer {
  readonly latencyFrames: number;
  /** In place, one array a channel, all of one length. */
  process(channels: readonly Float64Array[]): void;
}

interface RetimeOptions {
  readonly channelCount: number;
  readonly latencyFrames: number;
  /** Frames further back than the latency that may be asked for. */
  readonly reachFrames: number;
  /** Frames by which the frame with this number is read late; negative is early. */
  readonly lagOf: (frame: number) => number;
}

function createRetimer({ channelCount, latencyFrames, reachFrames, lagOf }: RetimeOptions): StreamRetimer {
  const kernel = createKernel();
  const size = 2 ** Math.ceil(Math.log2(latencyFrames + reachFrames + 2 * KERNEL_REACH + 2));
  const mask = size - 1;
  const rings = Array.from({ length: channelCount }, () => new Float64Array(size));
  let frame = 0;
  return {
    latencyFrames,
    process: (channels) => {
      const count = channels[0]?.length ?? 0;
      for (let n = 0; n < count; n++, frame++) {
        const position = frame - latencyFrames - lagOf(frame);
        const base = Math.floor(position);
        const fraction = position - base;
        for (let c = 0; c < channels.length; c++) {
          const ring = rings[c];
          ring[frame & mask] = channels[c][n];
          channels[c][n] = fraction === 0 ? ring[base & mask] : weigh(ring, mask, base, fraction, kernel);
        }
      }
    },
  };
}

function weigh(ring: Float64Array, mask: number, base: number, fraction: number, kernel: Kernel): number {
  const taps = kernel.tapsAt(fraction);
  const first = base - KERNEL_REACH + 1;
  let sum = 0;
  for (let k = 0; k < taps.length; k++) sum += taps[k] * ring[(first + k) & mask];
  return sum;
}

/** A delay of whole frames is exact; a fraction comes after the kernel's reach, told as latency. */
export function createDelayStream({ samples }: DelayStage, channelCount: number): StreamRetimer {
  const isWhole = Number.isInteger(samples) && samples >= 0;
  return createRetimer({
    channelCount,
    latencyFrames: isWhole ? 0 : KERNEL_REACH + Math.max(0, Math.ceil(-samples)),
    reachFrames: Math.ceil(Math.abs(samples)),
    lagOf: () => samples,
  });
}

/** Jitter as on the whole recording: frame n is read J(n) later in the signal. */
export function createJitterStream(
  stage: JitterStage,
  { channelCount, sampleRateHz, random }: { channelCount: number; sampleRateHz: number; random: Random },
): StreamRetimer {
  const framesPerPs = SECONDS_PER_PS * sampleRateHz;
  const sine = createSine(stage.frequencyHz ?? 0, sampleRateHz);
  const draw = createGaussian(random);
  const peakFrames = ((stage.peakToPeakPs ?? 0) / 2) * framesPerPs;
  const rmsFrames = (stage.rmsPs ?? 0) * framesPerPs;
  const isRandom = stage.rmsPs !== undefined;
  return createRetimer({
    channelCount,
    latencyFrames: KERNEL_REACH + 8,
    reachFrames: 8,
    lagOf: (frame) => -(isRandom ? rmsFrames * draw() : peakFrames * sine(frame)),
  });
}

/**
 * A clock that is off. A live stream can't give more frames than it is given: the reading place drifts through a room of
 * frames and, at its end, begins again in the middle, which is a break of the signal (after 7 min at 200 ppm, 48 kHz).
 */
export function createClockStream({ ppm }: ClockStage, channelCount: number): StreamRetimer {
  const driftPerFrame = ppm * 1e-6;
  const half = CLOCK_ROOM_FRAMES / 2;
  return createRetimer({
    channelCount,
    latencyFrames: KERNEL_REACH + half,
    reachFrames: half,
    lagOf: (frame) => {
      const drift = frame * driftPerFrame;
      return -(drift - CLOCK_ROOM_FRAMES * Math.round(drift / CLOCK_ROOM_FRAMES));
    },
  });
}
