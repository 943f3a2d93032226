import { createPracticeStream, parseDevice, type PracticeStream } from '@benchlark/dsp';
import { PRACTICE } from './worklet-names';

/** The practice device in the signal's path: the very code that the command line has. */
class PracticeProcessor extends AudioWorkletProcessor {
  readonly #stream: PracticeStream;

  constructor({ processorOptions }: AudioWorkletNodeOptions) {
    super();
    const { device } = processorOptions as { device: unknown };
    this.#stream = createPracticeStream(parseDevice(device), sampleRate, 2);
    this.port.onmessage = ({ data }: MessageEvent<unknown>) => this.#stream.setDevice(parseDevice(data));
  }

  process([input]: Float32Array[][], [output]: Float32Array[][]): boolean {
    if (output && output.length > 0) this.#stream.processInto(input ?? [], output);
    return true;
  }
}

registerProcessor(PRACTICE, PracticeProcessor);
