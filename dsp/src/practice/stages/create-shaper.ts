import { dbfsToMeanSquare, dbToRatio } from '../../level/decibel.js';
import { createGaussian } from '../../random/create-gaussian.js';
import type { Random } from '../../random/create-random.js';
import type {
  ClockStage,
  CrosstalkStage,
  DelayStage,
  JitterStage,
  LeadStage,
  PracticeStage,
} from '../device.js';
import { bendByClip, bendByDeadZone, bendByPolynomial, bendBySoftClip, type Bend } from './bend.js';
import { createBiquad } from './biquad.js';
import { designFilter } from './design-filter.js';
import { createSine } from './oscillator.js';
import { quantise } from './quantise.js';

/** Stages that work sample by sample within one channel. */
export type ChannelStage = Exclude<
  PracticeStage,
  CrosstalkStage | DelayStage | JitterStage | ClockStage | LeadStage
>;

/** Passes the next samples of a channel through its stage, in place. */
export type Shaper = (samples: Float64Array) => void;

function mapping(bend: Bend): Shaper {
  return (samples) => {
    for (let n = 0; n < samples.length; n++) samples[n] = bend(samples[n]);
  };
}

/** Hands each sample to `work` with the sine of its own frame, counted over all blocks. */
function withSine(
  sampleRateHz: number,
  frequencyHz: number,
  work: (sample: number, sine: number) => number,
): Shaper {
  const sine = createSine(frequencyHz, sampleRateHz);
  let frame = 0;
  return (samples) => {
    for (let n = 0; n < samples.length; n++) samples[n] = work(samples[n], sine(frame + n));
    frame += samples.length;
  };
}

function addingSine(sampleRateHz: number, frequencyHz: number, levelDbfs: number): Shaper {
  const amplitude = dbToRatio(levelDbfs);
  return withSine(sampleRateHz, frequencyHz, (sample, sine) => sample + amplitude * sine);
}

const inTurn =
  (shapers: readonly Shaper[]): Shaper =>
  (samples) =>
    shapers.forEach((shape) => shape(samples));

/**
 * Makes one channel's way through a stage: whatever the blocks, the samples come out the same.
 *
 * @param random - the stage's own source of noise and dither for this channel
 * @returns takes samples, linear, ±1.0 = full scale, in their order
 */
export function createShaper(stage: ChannelStage, sampleRateHz: number, random: Random): Shaper {
  switch (stage.kind) {
    case 'gain': {
      const gain = dbToRatio(stage.gainDb);
      return mapping((sample) => sample * gain);
    }
    case 'offset':
      return mapping((sample) => sample + stage.value);
    case 'polarity':
      return mapping((sample) => -sample);
    case 'polynomial':
      return mapping(bendByPolynomial(stage.coefficients));
    case 'clip':
      return mapping(bendByClip(stage.positive, stage.negative));
    case 'soft-clip':
      return mapping(bendBySoftClip(stage.positive, stage.negative, stage.kneeDb));
    case 'dead-zone':
      return mapping(bendByDeadZone(stage.width));
    case 'filter':
      return inTurn(designFilter(stage, sampleRateHz).map(createBiquad));
    case 'noise': {
      const rms = Math.sqrt(dbfsToMeanSquare(stage.levelDbfs));
      const draw = createGaussian(random);
      return mapping((sample) => sample + rms * draw());
    }
    case 'hum':
      return inTurn(
        stage.levelsDbfs.map((levelDbfs, index) =>
          addingSine(sampleRateHz, (index + 1) * stage.frequencyHz, levelDbfs),
        ),
      );
    case 'tone':
      return addingSine(sampleRateHz, stage.frequencyHz, stage.levelDbfs);
    case 'amplitude-modulation': {
      const depth = dbToRatio(stage.depthDb);
      return withSine(sampleRateHz, stage.frequencyHz, (sample, sine) => sample * (1 + depth * sine));
    }
    case 'quantise': {
      const dither = stage.dither === 'tpdf' ? random : null;
      return (samples) => quantise(samples, stage.bits, dither);
    }
  }
}
