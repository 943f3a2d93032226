// Our real FFT against scipy's, length by length, in turn.
import { spawn } from 'node:child_process';
import path from 'node:path';
import { createInterface } from 'node:readline';
import { createRandom, createRealFft } from '@benchlark/dsp';
import { printTable } from './measure.mjs';

const ROUNDS = 5;

function createReference() {
  const script = path.join(import.meta.dirname, 'fft_reference.py');
  const child = spawn('/usr/bin/python3', [script], { stdio: ['pipe', 'pipe', 'inherit'] });
  const lines = createInterface({ input: child.stdout })[Symbol.asyncIterator]();
  return {
    async time(length, runs) {
      child.stdin.write(`${length} ${runs}\n`);
      return Number((await lines.next()).value);
    },
    close: () => child.stdin.end(),
  };
}

function timeOurs(fft, samples, re, im, runs) {
  let bestUs = Infinity;
  for (let run = 0; run < runs; run++) {
    const startedMs = performance.now();
    fft.transform(samples, re, im);
    bestUs = Math.min(bestUs, (performance.now() - startedMs) * 1000);
  }
  return bestUs;
}

export async function measureFft() {
  const reference = createReference();
  const rows = [];
  for (let exponent = 12; exponent <= 20; exponent++) {
    const length = 2 ** exponent;
    const runs = Math.max(4, Math.min(400, Math.round(2 ** 23 / length)));
    const random = createRandom(1);
    const samples = Float64Array.from({ length }, () => random() - 0.5);
    const [re, im] = [new Float64Array(length / 2 + 1), new Float64Array(length / 2 + 1)];
    const fft = createRealFft(length);
    timeOurs(fft, samples, re, im, runs);
    let ours = Infinity;
    let scipy = Infinity;
    for (let round = 0; round < ROUNDS; round++) {
      ours = Math.min(ours, timeOurs(fft, samples, re, im, runs));
      scipy = Math.min(scipy, await reference.time(length, runs));
    }
    rows.push({
      points: length,
      'ours us': Math.round(ours),
      'scipy us': Math.round(scipy),
      ratio: (ours / scipy).toFixed(2),
    });
  }
  reference.close();
  printTable('Real FFT, double precision, best of five rounds', rows);
  return rows;
}
