import type { SampleSource } from '../../source/sample-source.js';
import type { WindowName } from '../../window/window-coefficients.js';
import type { AnalysisContext } from '../measure.js';
import { createSpectrumAccumulator, createSpectrumKit } from '../shared/averaged-spectrum.js';
import { amplitudeAt, type ComplexSpectrum, type SpectrumLine } from '../shared/fit-line.js';
import type { FramePlan } from '../shared/plan-frames.js';
import { streamFrames, type FrameRange } from '../shared/stream-frames.js';
import { createWindowTransform } from '../shared/window-transform.js';

/** A pair of sidebands taken apart by how it turns against the tone; amplitudes against the tone's. */
export interface SidebandPair {
  readonly offsetHz: number;
  /** What moves the tone in time: one side turned against the other. */
  readonly phase: number;
  /** What moves it in size: both sides alike. */
  readonly amplitude: number;
}

export interface SidebandRequest {
  readonly toneHz: number;
  readonly offsetsHz: readonly number[];
}

/**
 * Reads pairs of sidebands in step with their tone, frame by frame.
 *
 * Against the tone's own phase a pair of amplitude modulation is u and its conjugate, one of phase modulation u and its
 * conjugate turned by 180°; the sum and difference tell the two apart.
 *
 * @param requests - one a channel; null where there is nothing to read
 */
export async function readSidebands(
  source: SampleSource,
  range: FrameRange,
  plan: FramePlan,
  windowName: WindowName,
  requests: readonly (SidebandRequest | null)[],
  context: Pick<AnalysisContext, 'signal'>,
): Promise<SidebandPair[][]> {
  if (requests.every((request) => request === null || request.offsetsHz.length === 0)) {
    return requests.map(() => []);
  }
  const kit = createSpectrumKit(source.sampleRateHz, plan, windowName);
  const transform = createWindowTransform(windowName, plan.fftLength);
  const perBin = plan.fftLength / source.sampleRateHz;
  const sums = requests.map((request) => (request?.offsetsHz ?? []).map(() => ({ phase: 0, amplitude: 0 })));
  const addFrame = (spectrum: ComplexSpectrum, channel: number): void => {
    const request = requests[channel];
    if (request === null) return;
    const tone = amplitudeAt(spectrum, transform, request.toneHz * perBin);
    request.offsetsHz.forEach((offsetHz, index) => {
      const upper = against(amplitudeAt(spectrum, transform, (request.toneHz + offsetHz) * perBin), tone);
      const lower = against(amplitudeAt(spectrum, transform, (request.toneHz - offsetHz) * perBin), tone);
      const sum = sums[channel][index];
      sum.amplitude += ((upper.re + lower.re) ** 2 + (upper.im - lower.im) ** 2) / 4;
      sum.phase += ((upper.re - lower.re) ** 2 + (upper.im + lower.im) ** 2) / 4;
    });
  };
  const accumulators = requests.map((_, channel) =>
    createSpectrumAccumulator(kit, (spectrum) => {
      addFrame(spectrum, channel);
    }),
  );
  await streamFrames(source, range, context, (channels) => {
    channels.forEach((samples, channel) => {
      accumulators[channel].push(samples);
    });
  });
  const frames = plan.starts.length;
  return requests.map((request, channel) =>
    (request?.offsetsHz ?? []).map((offsetHz, index) => ({
      offsetHz,
      phase: Math.sqrt(sums[channel][index].phase / frames),
      amplitude: Math.sqrt(sums[channel][index].amplitude / frames),
    })),
  );
}

/** A line divided by the tone, phases and all. */
function against(line: SpectrumLine, tone: SpectrumLine): { re: number; im: number } {
  const size = tone.inPhase ** 2 + tone.quadrature ** 2;
  return {
    re: (line.inPhase * tone.inPhase + line.quadrature * tone.quadrature) / size,
    im: (line.quadrature * tone.inPhase - line.inPhase * tone.quadrature) / size,
  };
}
