// The Live page with the practice device in a real browser: what a picture costs, and whether the page stays free.
import { chromium } from 'playwright-core';
import { CHROMIUM, CHROMIUM_FLAGS } from '../in-browser.mjs';
import { percentile, printTable } from './measure.mjs';

const LENGTHS = { 16_384: '16k', 32_768: '32k', 65_536: '64k', 131_072: '128k', 262_144: '256k' };
const EACH_MS = 12_000;
const LONG_TASKS_MS = 60_000;

/** Runs in the page: counts the worker's pictures as they come in, and tasks over 50 ms. */
function watchPage() {
  const seen = { tookMs: [], longTasksMs: [] };
  globalThis.seen = seen;
  const add = MessagePort.prototype.addEventListener;
  MessagePort.prototype.addEventListener = function (type, listener, options) {
    if (type === 'message') {
      add.call(this, 'message', ({ data }) => {
        if (data?.path?.[0] === 'onSpectrum') seen.tookMs.push(data.argumentList[0].value.tookMs);
      });
    }
    return add.call(this, type, listener, options);
  };
  new PerformanceObserver((list) => {
    for (const { duration } of list.getEntries()) seen.longTasksMs.push(duration);
  }).observe({ type: 'longtask' });
}

/** Opens the Live page of a demo bench and plays a tone through the practice device. */
export async function openLiveBench(service) {
  const { demo } = await (await fetch(`${service.url}/api/session`)).json();
  const { email, password } = demo.accounts.find(({ roles }) => roles.includes('technician'));
  const browser = await chromium.launch({
    executablePath: CHROMIUM,
    args: [...CHROMIUM_FLAGS, '--autoplay-policy=no-user-gesture-required'],
  });
  const page = await browser.newPage({ viewport: { width: 1440, height: 940 } });
  await page.addInitScript(watchPage);
  await page.goto(`${service.url}/sign-in`);
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password', { exact: true }).fill(password);
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await page.waitForURL((address) => !address.pathname.startsWith('/sign-in'));
  await page.goto(`${service.url}/live`);
  await page.getByRole('button', { name: 'Open the practice device' }).click();
  await page.getByRole('button', { name: /^Play/ }).click();
  await page.waitForTimeout(5000);
  return { browser, page };
}

/** Damaged blocks that the page has counted. */
export async function countBreaks(page) {
  const text = await page.locator('.bl-station').filter({ hasText: 'analysis' }).innerText();
  return Number(/(\d+) damaged/.exec(text)?.[1] ?? 0);
}

export async function forget(page) {
  await page.evaluate(() => {
    globalThis.seen.tookMs.length = 0;
    globalThis.seen.longTasksMs.length = 0;
  });
}

export const readSeen = (page) => page.evaluate(() => globalThis.seen);

/** Time of a picture in the worker and pictures a second by length of the transform; long tasks in a minute. */
export async function measureLive(service) {
  const { browser, page } = await openLiveBench(service);
  try {
    const rows = [];
    for (const [points, label] of Object.entries(LENGTHS)) {
      await page.getByRole('button', { name: /^Points, / }).click();
      await page.getByRole('menuitemradio', { name: `${label} points` }).click();
      // The longest window holds 2.7 s.
      await page.waitForTimeout(4000);
      await forget(page);
      await page.waitForTimeout(EACH_MS);
      const { tookMs } = await readSeen(page);
      rows.push({
        points: Number(points),
        'worker median ms': Number(percentile(tookMs, 0.5).toFixed(1)),
        'worker p95 ms': Number(percentile(tookMs, 0.95).toFixed(1)),
        'pictures a second': Number((tookMs.length / (EACH_MS / 1000)).toFixed(1)),
      });
    }
    await page.getByRole('button', { name: /^Points, / }).click();
    await page.getByRole('menuitemradio', { name: '64k points' }).click();
    await page.waitForTimeout(4000);
    await forget(page);
    await page.waitForTimeout(LONG_TASKS_MS);
    const { longTasksMs, tookMs } = await readSeen(page);
    const minute = {
      'long tasks': longTasksMs.length,
      'longest ms': Math.round(Math.max(0, ...longTasksMs)),
      pictures: tookMs.length,
      'damaged blocks': await countBreaks(page),
    };
    printTable('The Live page, 96 kHz stereo, both channels in a picture', rows);
    printTable('One minute of it at 64k points', [minute]);
    return { lengths: rows, minute };
  } finally {
    await browser.close();
  }
}
