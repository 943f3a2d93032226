// Serves the small page that runs dsp in a worker, and opens it in Debian's Chromium.
import path from 'node:path';
import { chromium } from 'playwright-core';
import { createServer } from 'vite';
import { ROOT } from './workspace.mjs';

export const CHROMIUM = '/usr/bin/chromium';
export const CHROMIUM_FLAGS = [
  '--no-sandbox',
  '--disable-gpu',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

export async function openInBrowserPage() {
  const server = await createServer({
    configFile: false,
    root: path.join(ROOT, 'app/e2e/in-browser'),
    cacheDir: path.join(ROOT, 'node_modules/.vite-in-browser'),
    logLevel: 'error',
    resolve: { conditions: ['source', 'module', 'browser', 'development|production'] },
    worker: { format: 'es' },
    optimizeDeps: { include: ['comlink'] },
    server: { host: '127.0.0.1', port: 0, fs: { allow: [ROOT] } },
  });
  await server.listen();
  const browser = await chromium.launch({ executablePath: CHROMIUM, args: CHROMIUM_FLAGS });
  const page = await browser.newPage();
  await page.goto(server.resolvedUrls.local[0]);
  return {
    page,
    async close() {
      await browser.close();
      await server.close();
    },
  };
}
