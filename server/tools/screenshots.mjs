// node server/tools/screenshots.mjs: makes README's pictures (app/docs) from the demo data.
//   --all FOLDER   every page at 1440 and 390 px in both themes instead, for looking through
import { mkdirSync } from 'node:fs';
import path from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { chromium } from 'playwright-core';
import { CHROMIUM, CHROMIUM_FLAGS } from './in-browser.mjs';
import { startCluster } from './postgres.mjs';
import { startService } from './service.mjs';
import { setup } from './setup.mjs';
import { ROOT, ensureDebian } from './workspace.mjs';

const ANALYSIS_DEADLINE_MS = 120_000;
/** Parts of the full programme in the order played. */
const PROGRAMME_PARTS = [
  'programme-tone',
  'programme-low-level',
  'programme-idle',
  'level-steps',
  'sweep',
  'separation',
  'modulation-pair',
  'difference-pair',
  'modulation-steps',
  'difference-steps',
  'multitone',
  'jitter',
  'intersample',
  'filter',
];

async function signInPage(page, url, account) {
  await page.goto(`${url}/sign-in`);
  await page.getByLabel('E-mail').fill(account.email);
  await page.getByLabel('Password', { exact: true }).fill(account.password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL((address) => !address.pathname.startsWith('/sign-in'));
}

const getJson = async (page, address) => (await page.request.get(address)).json();

async function waitForAnalyses(page, url) {
  const deadline = Date.now() + ANALYSIS_DEADLINE_MS;
  for (;;) {
    const { items } = await getJson(page, `${url}/api/captures?limit=50`);
    if (items.every(({ state }) => !['queued', 'analysing'].includes(state))) return items;
    if (Date.now() > deadline) throw new Error('the demo captures are not analysed after two minutes');
    await sleep(500);
  }
}

async function settle(page) {
  await page.waitForLoadState('networkidle');
  await page.evaluate('document.fonts.ready');
  await sleep(400);
}

/** A faulty practice device under a tone, once its averages are full. */
async function playPractice(page) {
  await page.getByRole('button', { name: /^Left cut off at, / }).click();
  await page.getByRole('textbox').fill('-2.35');
  await page.keyboard.press('Enter');
  await page.getByRole('button', { name: 'Open the practice device' }).click();
  await page.getByRole('button', { name: /^Level, / }).click();
  await page.getByRole('dialog').getByRole('textbox').fill('-1');
  await page.keyboard.press('Enter');
  await page.getByRole('button', { name: /^Play/ }).click();
  await sleep(12_000);
}

async function main() {
  await setup();
  ensureDebian('command -v chromium', ['chromium'], 'taking screenshots');
  const isAll = process.argv.includes('--all');
  const folder = isAll
    ? path.resolve(process.argv[process.argv.indexOf('--all') + 1])
    : path.join(ROOT, 'app/docs');
  mkdirSync(folder, { recursive: true });
  const { adminUrl } = await startCluster();
  const service = await startService({ adminUrl, env: { DEMO: 'true' }, seed: 'demo/seed.js' });
  const browser = await chromium.launch({ executablePath: CHROMIUM, args: CHROMIUM_FLAGS });
  try {
    const { demo } = await (await fetch(`${service.url}/api/session`)).json();
    const holding = (role) => demo.accounts.find(({ roles }) => roles.includes(role));
    const open = async (width, theme, role) => {
      const context = await browser.newContext({
        viewport: { width, height: width < 700 ? 844 : 940 },
        colorScheme: theme,
        reducedMotion: 'reduce',
      });
      const page = await context.newPage();
      if (role) await signInPage(page, service.url, holding(role));
      return page;
    };
    const reviewer = await open(1440, 'light', 'reviewer');
    const items = await waitForAnalyses(reviewer, service.url);
    const named = (part) => items.find(({ fileName }) => fileName.includes(part));
    const { items: units } = await getJson(reviewer, `${service.url}/api/units`);
    const { items: rigs } = await getJson(reviewer, `${service.url}/api/rigs`);
    const unit = units.find(({ model }) => model === 'Corrie H2');
    const pages = {
      'sign-in': { address: '/sign-in', role: null },
      today: { address: '/', role: 'reviewer' },
      archive: { address: '/archive', role: 'reviewer' },
      capture: { address: `/captures/${named('received-tone').id}`, role: 'reviewer' },
      idle: { address: `/captures/${named('received-idle').id}`, role: 'reviewer' },
      'low-level': { address: `/captures/${named('candle-220417-low').id}`, role: 'reviewer' },
      programme: { address: `/captures/${named('candle-220417-programme').id}`, role: 'reviewer' },
      ...Object.fromEntries(
        PROGRAMME_PARTS.map((part, index) => [
          part,
          {
            address: `/captures/${named('candle-220417-programme').id}?segment=${index + 1}`,
            role: 'reviewer',
          },
        ]),
      ),
      stimuli: { address: '/stimuli?name=level-steps', role: 'reviewer' },
      live: { address: '/live', role: 'reviewer', act: playPractice },
      rigs: { address: '/rigs', role: 'reviewer' },
      rig: { address: `/rigs/${rigs.find(({ name }) => name === 'Window bench').id}`, role: 'reviewer' },
      units: { address: '/units', role: 'reviewer' },
      unit: { address: `/units/${unit.id}`, role: 'reviewer' },
      account: { address: '/account', role: 'reviewer' },
      people: { address: '/people', role: 'administrator' },
    };
    const tour = [
      'today',
      'archive',
      'capture',
      'idle',
      'unit',
      'programme',
      'level-steps',
      'stimuli',
      'live',
    ];
    for (const width of isAll ? [1440, 390] : [1440]) {
      for (const theme of isAll ? ['light', 'dark'] : ['light']) {
        const opened = { null: await open(width, theme, null) };
        for (const role of ['reviewer', 'administrator']) opened[role] = await open(width, theme, role);
        for (const [name, { address, role, act }] of Object.entries(pages)) {
          if (!isAll && !tour.includes(name)) continue;
          const page = opened[role];
          await page.goto(`${service.url}${address}`);
          await settle(page);
          if (act) await act(page);
          const file = isAll ? `${name}-${theme}-${width}.png` : `${name}.png`;
          await page.screenshot({ path: path.join(folder, file), fullPage: true });
        }
      }
    }
  } finally {
    await browser.close();
    await service.stop();
  }
}

main().catch((error) => {
  console.error(`benchlark: ${error.message}`);
  process.exitCode = 1;
});
