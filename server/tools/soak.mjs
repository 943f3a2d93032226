// npm run soak: the Live page for ten minutes (or `-- --minutes N`): damaged blocks and memory, a row every half minute.
import { execFileSync } from 'node:child_process';
import { startCluster } from './postgres.mjs';
import { startService } from './service.mjs';
import { setup } from './setup.mjs';
import { countBreaks, forget, openLiveBench, readSeen } from './speed/live.mjs';
import { ensureDebian } from './workspace.mjs';

const EVERY_MS = 30_000;
const MIB = 1024 * 1024;

function chosenMinutes() {
  const flag = process.argv.indexOf('--minutes');
  const minutes = flag < 0 ? 10 : Number(process.argv[flag + 1]);
  if (!(minutes > 0)) throw new Error('--minutes takes a number above 0');
  return minutes;
}

/** Of every process of the browsers that this process has started. */
function browserMemoryMib() {
  const rows = execFileSync('ps', ['-eo', 'pid=,ppid=,rss='], { encoding: 'utf8' })
    .trim()
    .split('\n')
    .map((line) => line.trim().split(/\s+/).map(Number));
  const ours = new Set([process.pid]);
  // Parents stand before their children often, not always.
  for (let size = 0; size !== ours.size;) {
    size = ours.size;
    for (const [pid, parent] of rows) if (ours.has(parent)) ours.add(pid);
  }
  const names = execFileSync('ps', ['-eo', 'pid=,comm='], { encoding: 'utf8' });
  const isBrowser = (pid) => new RegExp(`^\\s*${pid} +chrom`, 'm').test(names);
  return rows.reduce((sum, [pid, , rss]) => sum + (ours.has(pid) && isBrowser(pid) ? rss / 1024 : 0), 0);
}

async function heapMib(page) {
  const session = await page.context().newCDPSession(page);
  await session.send('HeapProfiler.collectGarbage');
  const { usedSize } = await session.send('Runtime.getHeapUsage');
  await session.detach();
  return usedSize / MIB;
}

async function main() {
  const minutes = chosenMinutes();
  await setup();
  ensureDebian('command -v chromium', ['chromium'], 'the soak test');
  const { adminUrl } = await startCluster();
  const service = await startService({ adminUrl, env: { DEMO: 'true' }, seed: 'demo/seed.js' });
  const { browser, page } = await openLiveBench(service);
  const rows = [];
  try {
    const count = Math.ceil((minutes * 60_000) / EVERY_MS);
    for (let index = 1; index <= count; index += 1) {
      await forget(page);
      await page.waitForTimeout(EVERY_MS);
      const { tookMs, longTasksMs } = await readSeen(page);
      const row = {
        minute: (index * EVERY_MS) / 60_000,
        pictures: tookMs.length,
        'long tasks': longTasksMs.length,
        'damaged blocks': await countBreaks(page),
        'page heap MiB': Number((await heapMib(page)).toFixed(1)),
        'browser MiB': Math.round(browserMemoryMib()),
      };
      rows.push(row);
      console.log(JSON.stringify(row));
    }
  } finally {
    await browser.close();
    await service.stop();
  }
  console.table(rows);
}

await main();
