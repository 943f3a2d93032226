import { ToneSource, type ToneRequest } from './tone-source';
import { GENERATOR } from './worklet-names';

/** Steady tones, in double precision up to the block; an OscillatorNode has spurs at -145 dB. */
class GeneratorProcessor extends AudioWorkletProcessor {
  readonly #source = new ToneSource(sampleRate);

  constructor() {
    super();
    this.port.onmessage = ({ data }: MessageEvent<ToneRequest | null>) => {
      if (data === null) this.#source.stop();
      else this.#source.set(data);
    };
  }

  process(_inputs: Float32Array[][], [output]: Float32Array[][]): boolean {
    const [left, right] = output ?? [];
    if (left) this.#source.fill(left, right ?? null);
    return true;
  }
}

registerProcessor(GENERATOR, GeneratorProcessor);
