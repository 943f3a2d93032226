import { overlapOf, rampGain, type SectionRun, type Span } from './span.js';

/** Noise of uniform density, white, the same for a seed at any rate. */
export interface WhiteNoiseSection extends Span {
  readonly kind: 'white-noise';
  readonly rampFrames: number;
  /** Greatest magnitude. */
  readonly peak: number;
  readonly seed: number;
}

/** Mixes a counter into 32 random bits, so that any frame can be had without those before it. */
function mixBits(value: number): number {
  let bits = Math.imul(value ^ (value >>> 16), 0x85ebca6b);
  bits = Math.imul(bits ^ (bits >>> 13), 0xc2b2ae35);
  return (bits ^ (bits >>> 16)) >>> 0;
}

/**
 * @see A. Appleby's public-domain finaliser of 32-bit hashes (from memory), over a counter of golden-ratio steps; twice,
 *   so that neighbouring seeds share nothing
 */
function noiseAt(frame: number, seed: number): number {
  const first = mixBits((Math.imul(frame, 0x9e3779b9) + seed) | 0);
  return mixBits((first ^ Math.imul(seed, 0x85ebca77)) | 0) / 2147483648 - 1;
}

export function addWhiteNoise(section: WhiteNoiseSection, run: SectionRun): void {
  const { frameCount, rampFrames, peak, seed } = section;
  const { first, end, frame: firstFrame } = overlapOf(section, run);
  for (let n = first, frame = firstFrame; n < end; n++, frame++) {
    run.samples[n] += peak * rampGain(frame, frameCount, rampFrames) * noiseAt(frame, seed);
  }
}
