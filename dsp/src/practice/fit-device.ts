import { DspInputError } from '../errors.js';
import { createRandom, type Random } from '../random/create-random.js';
import type { PracticeDevice, PracticeStage, StageChannel } from './device.js';

const CHANNEL_INDEX: Readonly<Record<Exclude<StageChannel, 'both'>, number>> = { left: 0, right: 1 };

/** Odd, so that neighbouring stages and channels draw from seeds far apart. */
const SEED_STRIDE = 0x9e3779b1;
const MOST_CHANNELS = 64;

/** The source of noise of one stage in one channel. */
export function randomOf(seed: number, stageIndex: number, channelIndex: number): Random {
  return createRandom((seed + Math.imul(stageIndex * MOST_CHANNELS + channelIndex + 1, SEED_STRIDE)) >>> 0);
}

function refuse(index: number, stage: PracticeStage, what: string): never {
  throw new DspInputError('BAD_DEVICE', `the practice device's stages[${index}] (${stage.kind}) ${what}`);
}

/**
 * Holds what a device asks for against the recording that it gets.
 *
 * @throws DspInputError `BAD_DEVICE` naming the stage that doesn't fit
 */
export function checkFit(device: PracticeDevice, sampleRateHz: number, channelCount: number): void {
  if (device.sampleRateHz !== null && device.sampleRateHz !== sampleRateHz) {
    throw new DspInputError(
      'BAD_DEVICE',
      `the practice device's sampleRateHz is ${device.sampleRateHz}, and the recording's ${sampleRateHz} Hz`,
    );
  }
  device.stages.forEach((stage, index) => {
    if (stage.channel === 'right' && channelCount < 2) {
      refuse(index, stage, 'has channel "right", and the recording has one channel');
    }
    if (stage.kind === 'crosstalk' && channelCount !== 2) {
      refuse(index, stage, `needs two channels, and the recording has ${channelCount}`);
    }
    if (!('frequencyHz' in stage) || stage.frequencyHz === undefined) return;
    const multiples = stage.kind === 'hum' ? stage.levelsDbfs.length : 1;
    if (!(stage.frequencyHz * multiples < sampleRateHz / 2)) {
      refuse(index, stage, `reaches ${stage.frequencyHz * multiples} Hz, beyond half of ${sampleRateHz} Hz`);
    }
  });
}

/** Which channels a stage is for. */
export function channelsOf(stage: PracticeStage, channelCount: number): readonly number[] {
  if (stage.channel !== 'both') return [CHANNEL_INDEX[stage.channel]];
  return Array.from({ length: channelCount }, (_, index) => index);
}
