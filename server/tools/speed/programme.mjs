// The programme of two minutes as a whole process, each of its measures alone, and a scipy script of its sweep and steps.
import path from 'node:path';
import { STIMULUS_KINDS } from '@benchlark/dsp';
import { ROOT } from '../workspace.mjs';
import { median, printTable, runMeasured, toMebibytes, toMs } from './measure.mjs';

const ROUNDS = 3;
const RATE_HZ = '96000';
const SCIPY_ONE_THREAD = { OPENBLAS_NUM_THREADS: '1', OMP_NUM_THREADS: '1' };
const CLI = path.join(ROOT, 'server/dist/cli/main.js');

const run = (...args) => runMeasured(process.execPath, [CLI, ...args]);

function row(name, runs) {
  return {
    process: name,
    'median ms': toMs(median(runs.map(({ elapsedMs }) => elapsedMs))),
    'least ms': toMs(Math.min(...runs.map(({ elapsedMs }) => elapsedMs))),
    'peak MiB': toMebibytes(Math.max(...runs.map(({ peakBytes }) => peakBytes))),
  };
}

async function repeat(work) {
  const runs = [];
  for (let round = 0; round < ROUNDS; round++) runs.push(await work());
  return runs;
}

export async function measureProgramme(folder) {
  const fileOf = (name) => path.join(folder, `${name}.wav`);
  const make = (name) => run('stimulus', name, '--rate', RATE_HZ, '--bits', '24', '--out', fileOf(name));
  await make('programme');
  const analyse = (file, measure) => run('analyse', file, '--measure', measure, '--json', '--traces', 'none');
  const whole = row(
    'benchlark, whole programme',
    await repeat(() => analyse(fileOf('programme'), 'programme')),
  );
  const descriptor = ['--stimulus', fileOf('programme').replace('.wav', '.json')];
  const ours = await repeat(async () => {
    const steps = await run(
      'analyse',
      fileOf('programme'),
      '--measure',
      'level-steps',
      ...descriptor,
      '--json',
    );
    const sweep = await run('analyse', fileOf('programme'), '--measure', 'sweep', ...descriptor, '--json');
    return {
      elapsedMs: steps.elapsedMs + sweep.elapsedMs,
      peakBytes: Math.max(steps.peakBytes, sweep.peakBytes),
    };
  });
  const script = path.join(import.meta.dirname, 'programme_reference.py');
  const scipy = await repeat(() =>
    runMeasured('/usr/bin/python3', [script, fileOf('programme')], SCIPY_ONE_THREAD),
  );
  const rows = [
    whole,
    row('benchlark, its sweep and steps in two processes', ours),
    row('scipy, its sweep and steps in one, one thread', scipy),
  ];
  printTable('A programme of two minutes, 96 kHz, 24 bit, stereo (aim 4 s on one core, 500 MB)', rows);
  const alone = [];
  for (const { name, measure } of STIMULUS_KINDS) {
    if (measure === 'programme') continue;
    await make(name);
    alone.push(row(`${measure} (${name})`, await repeat(() => analyse(fileOf(name), measure))));
  }
  printTable('Each measure alone on its stimulus, 96 kHz, 24 bit, stereo: whole process', alone);
  return { rows, alone };
}
