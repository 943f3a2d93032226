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
import { runBiquad } from './biquad.js';
import { designFilter } from './design-filter.js';
import { createSine } from './oscillator.js';
import { quantise } from './quantise.js';

/** Stages that work sample by sample within one channel. */
export type ChannelStage = Exclude<
  PracticeStage,
  CrosstalkStage | DelayStage | JitterStage | ClockStage | LeadStage
>;

function mapInPlace(samples: Float64Array, bend: Bend): void {
  for (let n = 0; n < samples.length; n++) samples[n] = bend(samples[n]);
}

function addSine(samples: Float64Array, sampleRateHz: number, frequencyHz: number, levelDbfs: number): void {
  const amplitude = dbToRatio(levelDbfs);
  const sine = createSine(frequencyHz, sampleRateHz);
  for (let n = 0; n < samples.length; n++) samples[n] += amplitude * sine(n);
}

/**
 * Passes one channel through a stage, in place.
 *
 * @param samples - linear, ±1.0 = full scale; modified
 * @param random - the stage's own source of noise and dither for this channel
 */
export function shapeChannel(
  stage: ChannelStage,
  samples: Float64Array,
  sampleRateHz: number,
  random: Random,
): void {
  switch (stage.kind) {
    case 'gain': {
      const gain = dbToRatio(stage.gainDb);
      return mapInPlace(samples, (sample) => sample * gain);
    }
    case 'offset':
      return mapInPlace(samples, (sample) => sample + stage.value);
    case 'polarity':
      return mapInPlace(samples, (sample) => -sample);
    case 'polynomial':
      return mapInPlace(samples, bendByPolynomial(stage.coefficients));
    case 'clip':
      return mapInPlace(samples, bendByClip(stage.positive, stage.negative));
    case 'soft-clip':
      return mapInPlace(samples, bendBySoftClip(stage.positive, stage.negative, stage.kneeDb));
    case 'dead-zone':
      return mapInPlace(samples, bendByDeadZone(stage.width));
    case 'filter':
      return designFilter(stage, sampleRateHz).forEach((section) => runBiquad(section, samples));
    case 'noise': {
      const rms = Math.sqrt(dbfsToMeanSquare(stage.levelDbfs));
      const draw = createGaussian(random);
      return mapInPlace(samples, (sample) => sample + rms * draw());
    }
    case 'hum':
      return stage.levelsDbfs.forEach((levelDbfs, index) =>
        addSine(samples, sampleRateHz, (index + 1) * stage.frequencyHz, levelDbfs),
      );
    case 'tone':
      return addSine(samples, sampleRateHz, stage.frequencyHz, stage.levelDbfs);
    case 'amplitude-modulation': {
      const depth = dbToRatio(stage.depthDb);
      const sine = createSine(stage.frequencyHz, sampleRateHz);
      for (let n = 0; n < samples.length; n++) samples[n] *= 1 + depth * sine(n);
      return;
    }
    case 'quantise':
      return quantise(samples, stage.bits, stage.dither === 'tpdf' ? random : null);
  }
}
