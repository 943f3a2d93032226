// `tone` as a whole process: against a scipy script of the same work, and its memory on a file of 1 GB.
import { createWriteStream } from 'node:fs';
import { once } from 'node:events';
import path from 'node:path';
import { createRandom, createWavEncoder } from '@benchlark/dsp';
import { ROOT } from '../workspace.mjs';
import { median, printTable, runMeasured, toMebibytes, toMs } from './measure.mjs';

const ROUNDS = 5;
const BLOCK_FRAMES = 65_536;
const SCIPY_ONE_THREAD = { OPENBLAS_NUM_THREADS: '1', OMP_NUM_THREADS: '1' };

/** Writes a 24-bit stereo tone at 96 kHz with a second harmonic 100 dB down and some noise. */
export async function writeTone(file, durationS) {
  const sampleRateHz = 96_000;
  const frameCount = Math.round(durationS * sampleRateHz);
  const encoder = createWavEncoder({
    sampleRateHz,
    channelCount: 2,
    frameCount,
    bits: 24,
    dither: 'tpdf',
    seed: 7,
  });
  const random = createRandom(3);
  const stream = createWriteStream(file);
  stream.write(encoder.header());
  for (let from = 0; from < frameCount; from += BLOCK_FRAMES) {
    const length = Math.min(BLOCK_FRAMES, frameCount - from);
    const channels = [997.3, 1499.7].map((frequencyHz) =>
      Float64Array.from({ length }, (_, index) => {
        const phase = 2 * Math.PI * (((frequencyHz * (from + index)) / sampleRateHz) % 1);
        return 0.89 * Math.sin(phase) + 8.9e-6 * Math.sin(2 * phase) + 1e-5 * (random() + random() - 1);
      }),
    );
    if (!stream.write(encoder.block(channels))) await once(stream, 'drain');
  }
  stream.end();
  await once(stream, 'close');
}

const analyse = (file) =>
  runMeasured(process.execPath, [
    path.join(ROOT, 'server/dist/cli/main.js'),
    ...['analyse', file, '--measure', 'tone', '--json', '--traces', 'none'],
  ]);

export async function measureTone(folder) {
  const file = path.join(folder, 'tone-120s.wav');
  await writeTone(file, 120);
  const script = path.join(import.meta.dirname, 'tone_reference.py');
  const ours = [];
  const scipy = [];
  for (let round = 0; round < ROUNDS; round++) {
    ours.push(await analyse(file));
    scipy.push(await runMeasured('/usr/bin/python3', [script, file], SCIPY_ONE_THREAD));
  }
  const row = (name, runs) => ({
    process: name,
    'median ms': toMs(median(runs.map((run) => run.elapsedMs))),
    'least ms': toMs(Math.min(...runs.map((run) => run.elapsedMs))),
    'peak MiB': toMebibytes(Math.max(...runs.map((run) => run.peakBytes))),
  });
  const rows = [row('benchlark analyse', ours), row('scipy, one thread', scipy)];
  const ratio = rows[0]['median ms'] / rows[1]['median ms'];
  printTable('`tone` on 120 s of 96 kHz, 24 bit, stereo: whole process, in turn', rows);
  console.log(`ratio ${ratio.toFixed(2)} (aim 1.0, stretch 0.5)`);
  return { rows, ratio };
}

export async function measureLargeTone(file) {
  const run = await analyse(file);
  const row = {
    file: '1 GB, 96 kHz, 24 bit, stereo',
    ms: toMs(run.elapsedMs),
    'peak MiB': toMebibytes(run.peakBytes),
  };
  printTable('`tone` on a large file (aim: peak under 300 MiB)', [row]);
  return row;
}
