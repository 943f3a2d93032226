// How the benchmark times and weighs: whole processes in turn, medians, peak memory as the kernel keeps it.
import { spawn } from 'node:child_process';
import { readFileSync } from 'node:fs';

const MIB = 1024 * 1024;

/** The most memory a process has held so far, bytes; null once it has ended. */
export function readPeakBytes(pid) {
  try {
    const match = /VmHWM:\s+(\d+) kB/.exec(readFileSync(`/proc/${pid}/status`, 'utf8'));
    return match ? Number(match[1]) * 1024 : null;
  } catch (error) {
    if (error.code === 'ENOENT' || error.code === 'ESRCH') return null;
    throw error;
  }
}

/** Runs a program to its end; gives what it printed, how long it took and the most memory it held. */
export function runMeasured(command, args, env = {}) {
  return new Promise((resolve, reject) => {
    const startedMs = performance.now();
    const child = spawn(command, args, {
      env: { ...process.env, ...env },
      stdio: ['ignore', 'pipe', 'pipe'],
    });
    let peakBytes = 0;
    let output = '';
    let errors = '';
    const watch = setInterval(() => {
      peakBytes = Math.max(peakBytes, readPeakBytes(child.pid) ?? 0);
    }, 10);
    child.stdout.on('data', (chunk) => (output += chunk));
    child.stderr.on('data', (chunk) => (errors += chunk));
    child.once('error', reject);
    child.once('close', (code) => {
      clearInterval(watch);
      const elapsedMs = performance.now() - startedMs;
      if (code === 0) resolve({ output, elapsedMs, peakBytes });
      else reject(new Error(`${command} ${args.join(' ')} ended with ${code}: ${errors.trim()}`));
    });
  });
}

export function median(values) {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[middle] : (sorted[middle - 1] + sorted[middle]) / 2;
}

export function percentile(values, share) {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.min(sorted.length - 1, Math.ceil(share * sorted.length) - 1)];
}

export const toMebibytes = (bytes) => Math.round(bytes / MIB);
export const toMs = (value) => Math.round(value);

/** Prints rows of equal keys as an aligned table. */
export function printTable(title, rows) {
  const keys = Object.keys(rows[0]);
  const widths = keys.map((key) => Math.max(key.length, ...rows.map((row) => String(row[key]).length)));
  const line = (cells) => cells.map((cell, index) => String(cell).padStart(widths[index])).join('  ');
  console.log(`\n${title}\n${line(keys)}`);
  for (const row of rows) console.log(line(keys.map((key) => row[key])));
}
