// `tone` on a large file in Chromium's worker: what the page's process holds at most.
import { readdirSync, readFileSync } from 'node:fs';
import { openInBrowserPage } from '../in-browser.mjs';
import { printTable, readPeakBytes, toMebibytes, toMs } from './measure.mjs';

/** The renderer processes below this one; the page's is the one that holds most. */
function findRendererPids() {
  return readdirSync('/proc')
    .filter((name) => /^\d+$/.test(name))
    .filter((pid) => {
      try {
        return readFileSync(`/proc/${pid}/cmdline`, 'utf8').includes('--type=renderer');
      } catch (error) {
        if (error.code === 'ENOENT' || error.code === 'ESRCH') return false;
        throw error;
      }
    })
    .map(Number);
}

export async function measureBrowserTone(file) {
  const { page, close } = await openInBrowserPage();
  try {
    await page.setInputFiles('#file', file);
    const before = Math.max(...findRendererPids().map((pid) => readPeakBytes(pid) ?? 0));
    const startedMs = performance.now();
    await page.evaluate('analyseChosenFile("tone")');
    const elapsedMs = performance.now() - startedMs;
    const peak = Math.max(...findRendererPids().map((pid) => readPeakBytes(pid) ?? 0));
    const row = {
      file: '1 GB in a worker',
      ms: toMs(elapsedMs),
      'peak MiB': toMebibytes(peak),
      'before MiB': toMebibytes(before),
    };
    printTable('`tone` on a large file in Chromium (aim: peak under 300 MiB)', [row]);
    return row;
  } finally {
    await close();
  }
}
