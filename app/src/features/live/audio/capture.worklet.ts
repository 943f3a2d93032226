import { CAPTURE } from './worklet-names';

/** Long enough that the worker isn't woken for every 128 frames, short enough for 20 pictures a second. */
const BLOCK_FRAMES = 2048;

/** Hands recorded blocks to the port it is given: the way in where a track can't be read directly. */
class CaptureProcessor extends AudioWorkletProcessor {
  #target: MessagePort | null = null;
  #blocks: Float32Array<ArrayBuffer>[] = [];
  #filled = 0;

  constructor() {
    super();
    this.port.onmessage = ({ data }: MessageEvent<MessagePort>) => {
      this.#target = data;
    };
  }

  process([input]: Float32Array[][]): boolean {
    const frames = input?.[0]?.length ?? 0;
    if (!input || frames === 0) return true;
    if (this.#blocks.length !== input.length) {
      this.#blocks = input.map(() => new Float32Array(BLOCK_FRAMES));
      this.#filled = 0;
    }
    input.forEach((samples, channel) => this.#blocks[channel]?.set(samples, this.#filled));
    this.#filled += frames;
    if (this.#filled + frames > BLOCK_FRAMES) this.#send();
    return true;
  }

  #send(): void {
    const channels = this.#blocks.map((block) => block.slice(0, this.#filled));
    this.#target?.postMessage(
      channels,
      channels.map(({ buffer }) => buffer),
    );
    this.#filled = 0;
  }
}

registerProcessor(CAPTURE, CaptureProcessor);
