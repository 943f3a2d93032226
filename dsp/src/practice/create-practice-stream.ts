import { dbToRatio, ratioToDb } from '../level/decibel.js';
import type { CrosstalkStage, PracticeDevice, PracticeStage } from './device.js';
import { channelsOf, checkFit, randomOf } from './fit-device.js';
import { createShaper } from './stages/create-shaper.js';
import {
  createClockStream,
  createDelayStream,
  createJitterStream,
  type StreamRetimer,
} from './stages/retime-stream.js';

/** A practice device that works on a signal as it comes, as on a bench. */
export interface PracticeStream {
  /** Frames by which the output lies behind, beyond what the device's own delay stages say. */
  readonly latencyFrames: number;
  /**
   * Passes the next frames through the device. Blocks of any length give the same samples.
   *
   * @param channels - one array a channel, all of one length; not modified
   */
  process(channels: readonly Float64Array[]): Float64Array[];
  /** The same for the blocks of an audio worklet; an input that is missing counts as silence. */
  processInto(input: readonly Float32Array[], output: readonly Float32Array[]): void;
  /** Exchanges the device; stages that stay as they were, at their place, go on without a break. */
  setDevice(device: PracticeDevice): void;
}

type StageStream = (channels: readonly Float64Array[]) => void;

interface Running {
  readonly key: string;
  readonly run: StageStream;
  readonly latencyFrames: number;
}

const OCTAVE_DB = ratioToDb(2);
const REFERENCE_HZ = 1000;
/** Of the integrators that a falling leak is made of: below it a leak rises no further. */
const LOWEST_HZ = 10;

/**
 * A leak without a look ahead: its slope to the nearest whole order, by differences (rising) or integrators (falling),
 * exact at 1 kHz. The whole-recording device has the slope itself and no phase.
 */
function createLeak(stage: CrosstalkStage, sampleRateHz: number): (sample: number) => number {
  const order = Math.round(stage.slopeDbPerOctave / OCTAVE_DB);
  const size = 2 * Math.sin((Math.PI * REFERENCE_HZ) / sampleRateHz);
  const held = new Float64Array(Math.abs(order));
  const keep = Math.exp((-2 * Math.PI * LOWEST_HZ) / sampleRateHz);
  const turn = (2 * Math.PI * REFERENCE_HZ) / sampleRateHz;
  const integrated = 1 / Math.hypot(1 - keep * Math.cos(turn), keep * Math.sin(turn));
  const gain = dbToRatio(stage.levelDb) / (order >= 0 ? size ** order : integrated ** -order);
  return (sample) => {
    let value = sample;
    for (let k = 0; k < held.length; k++) {
      if (order > 0) {
        const difference = value - held[k];
        held[k] = value;
        value = difference;
      } else {
        held[k] = value + keep * held[k];
        value = held[k];
      }
    }
    return gain * value;
  };
}

function createCrosstalk(
  stage: CrosstalkStage,
  indices: readonly number[],
  sampleRateHz: number,
): StageStream {
  const leaks = indices.map(() => createLeak(stage, sampleRateHz));
  return (channels) => {
    const [left, right] = channels;
    for (let n = 0; n < left.length; n++) {
      // Both leaks come out of the channels as they went in.
      const [l, r] = [left[n], right[n]];
      indices.forEach((index, k) => {
        if (index === 0) left[n] = l + leaks[k](r);
        else right[n] = r + leaks[k](l);
      });
    }
  };
}

function retimed(key: string, retimer: StreamRetimer, indices: readonly number[]): Running {
  return {
    key,
    latencyFrames: retimer.latencyFrames,
    run: (channels) => retimer.process(indices.map((index) => channels[index])),
  };
}

/**
 * Starts a practice device on a live signal.
 *
 * `lead` is left out, `clock` drifts within a room of frames (see `createClockStream`), a leak's slope is held to whole
 * orders; `delay` with a fraction, `jitter` and `clock` add a latency, which is told.
 *
 * @throws DspInputError `BAD_DEVICE` when the device doesn't fit the signal, naming the stage
 */
export function createPracticeStream(
  device: PracticeDevice,
  sampleRateHz: number,
  channelCount: number,
): PracticeStream {
  const start = (stage: PracticeStage, stageIndex: number, seed: number): Running => {
    const key = JSON.stringify([stage, seed]);
    const indices = channelsOf(stage, channelCount);
    const randomFor = (index: number) => randomOf(seed, stageIndex, index);
    switch (stage.kind) {
      case 'lead':
        return { key, latencyFrames: 0, run: () => undefined };
      case 'crosstalk':
        return { key, latencyFrames: 0, run: createCrosstalk(stage, indices, sampleRateHz) };
      case 'delay':
        return retimed(key, createDelayStream(stage, indices.length), indices);
      case 'jitter': {
        const options = { channelCount: indices.length, sampleRateHz, random: randomFor(0) };
        return retimed(key, createJitterStream(stage, options), indices);
      }
      case 'clock':
        return retimed(key, createClockStream(stage, channelCount), indices);
      case 'gain':
      case 'offset':
      case 'polynomial':
      case 'clip':
      case 'soft-clip':
      case 'dead-zone':
      case 'filter':
      case 'polarity':
      case 'noise':
      case 'hum':
      case 'tone':
      case 'amplitude-modulation':
      case 'quantise': {
        const shapers = indices.map((index) => createShaper(stage, sampleRateHz, randomFor(index)));
        return {
          key,
          latencyFrames: 0,
          run: (channels) => indices.forEach((index, k) => shapers[k](channels[index])),
        };
      }
    }
  };
  const fit = ({ stages, seed, ...rest }: PracticeDevice, before: readonly Running[]): readonly Running[] => {
    checkFit({ stages, seed, ...rest }, sampleRateHz, channelCount);
    return stages.map((stage, index) => {
      const kept = before[index];
      return kept?.key === JSON.stringify([stage, seed]) ? kept : start(stage, index, seed);
    });
  };
  let running = fit(device, []);
  let blocks: Float64Array[] = [];
  const process = (channels: readonly Float64Array[]): Float64Array[] => {
    const result = channels.map((samples) => samples.slice());
    for (const { run } of running) run(result);
    return result;
  };
  return {
    get latencyFrames() {
      return running.reduce((sum, { latencyFrames }) => sum + latencyFrames, 0);
    },
    process,
    processInto: (input, output) => {
      const count = output[0]?.length ?? 0;
      if (blocks[0]?.length !== count) {
        blocks = Array.from({ length: channelCount }, () => new Float64Array(count));
      }
      // A mono input feeds both channels, as an audio graph mixes it up.
      blocks.forEach((block, index) => {
        const samples = input[index] ?? input[0];
        if (samples === undefined) block.fill(0);
        else block.set(samples);
      });
      for (const { run } of running) run(blocks);
      output.forEach((samples, index) => samples.set(blocks[Math.min(index, channelCount - 1)]));
    },
    setDevice: (next) => {
      running = fit(next, running);
    },
  };
}
