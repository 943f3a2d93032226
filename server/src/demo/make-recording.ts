import { applyDevice, createStimulus, encodeWavBlocks, openMemorySource } from '@benchlark/dsp';
import type { DemoTake } from './scenario';

/** Where a plain fmt chunk leaves the size of the data: after RIFF and WAVE, fmt with 16 bytes, and the word "data". */
const DATA_SIZE_OFFSET = 40;
const UNKNOWN_SIZE = 0xffffffff;

async function* withoutDataSize(blocks: AsyncIterable<Uint8Array>): AsyncIterable<Uint8Array> {
  let isFirst = true;
  for await (const block of blocks) {
    if (isFirst) {
      isFirst = false;
      const header = Uint8Array.from(block);
      new DataView(header.buffer).setUint32(DATA_SIZE_OFFSET, UNKNOWN_SIZE, true);
      yield header;
    } else yield block;
  }
}

/** Plays a stimulus through a practice device and gives the bytes that a recorder would have written. */
export async function* makeRecording(take: DemoTake): AsyncIterable<Uint8Array> {
  const { sampleRateHz, bits, device, stimulus: name } = take;
  const stimulus = createStimulus(name, {
    sampleRateHz,
    bitsPerSample: bits,
    ...(take.isQuick ? { isQuick: true } : {}),
  });
  const { frameCount } = stimulus.source;
  const played = await stimulus.source.read(0, frameCount);
  const recorded = applyDevice(played, sampleRateHz, { ...device, sampleRateHz });
  const blocks = encodeWavBlocks(openMemorySource(recorded, sampleRateHz), {
    bits,
    dither: 'tpdf',
    seed: stimulus.encoding.seed + device.seed,
  });
  yield* take.isCutOff ? withoutDataSize(blocks) : blocks;
}
