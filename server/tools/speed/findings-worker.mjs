// Plays the quick programme through drawn devices, measures and proposes findings; one thread of several.
import { parentPort, workerData } from 'node:worker_threads';
import { applyDevice, createStimulus, getMeasure, openMemorySource, proposeFindings } from '@benchlark/dsp';
import { drawDevice } from './draw-devices.mjs';

const RATE_HZ = 48_000;

const { source } = createStimulus('programme', { sampleRateHz: RATE_HZ, bitsPerSample: 24, isQuick: true });
const played = await source.read(0, source.frameCount);

for (const { fault, seed } of workerData) {
  const channels = applyDevice(played, RATE_HZ, { ...drawDevice(fault, seed), sampleRateHz: RATE_HZ });
  const frameCount = channels[0].length;
  const capture = {
    sha256: '',
    sampleRateHz: RATE_HZ,
    channelCount: 2,
    bitsPerSample: 64,
    sampleFormat: 'float',
    frameCount,
    durationS: frameCount / RATE_HZ,
  };
  const record = await getMeasure('programme').analyse(openMemorySource(channels, RATE_HZ), {}, { capture });
  const named = proposeFindings(record)
    .filter(({ severity }) => severity !== 'note')
    .map(({ code }) => code);
  parentPort.postMessage({ fault, seed, named: [...new Set(named)] });
}
