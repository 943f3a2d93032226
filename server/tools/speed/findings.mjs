// Which faults are named: drawn devices with one fault each and as many without, as a table of confusion.
import { cpus } from 'node:os';
import path from 'node:path';
import { Worker } from 'node:worker_threads';
import { printTable } from './measure.mjs';
import { FAULTS } from './draw-devices.mjs';

const DEVICES = 200;
/** Seeds used while the rules were written lie elsewhere. */
const FIRST_SEED = 7_310_000;

function runWorker(jobs) {
  return new Promise((resolve, reject) => {
    const results = [];
    const worker = new Worker(path.join(import.meta.dirname, 'findings-worker.mjs'), { workerData: jobs });
    worker.on('message', (result) => results.push(result));
    worker.once('error', reject);
    worker.once('exit', (code) => {
      if (code === 0) resolve(results);
      else reject(new Error(`a thread of findings ended with ${code}`));
    });
  });
}

export async function measureFindings(firstSeed = FIRST_SEED, devices = DEVICES) {
  const faults = Object.keys(FAULTS);
  const faulty = Array.from({ length: devices }, (_, n) => ({
    fault: faults[n % faults.length],
    seed: firstSeed + n,
  }));
  const clean = Array.from({ length: devices }, (_, n) => ({ fault: null, seed: firstSeed + 50_000 + n }));
  const jobs = [...faulty, ...clean];
  const threads = Math.max(1, Math.min(4, cpus().length));
  const results = (
    await Promise.all(
      Array.from({ length: threads }, (_, thread) =>
        runWorker(jobs.filter((_job, n) => n % threads === thread)),
      ),
    )
  ).flat();
  const rows = faults.map((fault) => {
    const drawn = results.filter((result) => result.fault === fault);
    const others = drawn.flatMap(({ named }) => named.filter((code) => code !== fault));
    return {
      fault,
      drawn: drawn.length,
      named: drawn.filter(({ named }) => named.includes(fault)).length,
      'others named beside it':
        [...new Set(others)]
          .map((code) => `${code} ${others.filter((other) => other === code).length}`)
          .join(', ') || '-',
      limit: FAULTS[fault].limit,
    };
  });
  const cleanResults = results.filter(({ fault }) => fault === null);
  const wrong = cleanResults.filter(({ named }) => named.length > 0);
  rows.push({
    fault: 'none',
    drawn: cleanResults.length,
    named: wrong.length,
    'others named beside it': [...new Set(wrong.flatMap(({ named }) => named))].join(', ') || '-',
    limit: 'nothing above a note',
  });
  const hit = results.filter(({ fault, named }) => fault !== null && named.includes(fault)).length;
  const missed = results.filter(({ fault, named }) => fault !== null && !named.includes(fault));
  printTable(
    `Findings on ${devices} devices with a fault and ${devices} without, quick programme, 48 kHz`,
    rows,
  );
  console.log(
    `named ${((100 * hit) / devices).toFixed(1)} % (aim 95), false on clean units ${((100 * wrong.length) / devices).toFixed(1)} % (aim 1)`,
  );
  if (missed.length > 0)
    console.log(`missed: ${missed.map(({ fault, seed }) => `${fault} ${seed}`).join(', ')}`);
  if (wrong.length > 0)
    console.log(`false: ${wrong.map(({ seed, named }) => `${seed} ${named.join('+')}`).join(', ')}`);
  return { named: hit / devices, falseOnClean: wrong.length / devices, rows };
}
