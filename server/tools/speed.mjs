// npm run speed: the benchmark. Prints tables, then the same figures as one line of JSON.
//   npm run speed -- --only fft,tone,programme,findings,large,browser,upload,list,live
import { mkdtempSync, rmSync } from 'node:fs';
import { cpus, tmpdir } from 'node:os';
import path from 'node:path';
import { startCluster } from './postgres.mjs';
import { setup } from './setup.mjs';
import { ensureDebian } from './workspace.mjs';

const LARGE_DURATION_S = 1860; // 1.07e9 bytes at 96 kHz, 24 bit, stereo: just under the default limit of 1 GiB

function chosenParts(all) {
  const flag = process.argv.indexOf('--only');
  return flag < 0 ? all : (process.argv[flag + 1] ?? '').split(',');
}

async function main() {
  await setup();
  ensureDebian('/usr/bin/python3 -c "import scipy"', ['python3-scipy'], 'the yardstick of the benchmark');
  const { measureFft } = await import('./speed/fft.mjs');
  const { measureLargeTone, measureTone, writeTone } = await import('./speed/tone.mjs');
  const { measureFindings } = await import('./speed/findings.mjs');
  const { measureProgramme } = await import('./speed/programme.mjs');
  const { measureList, measureUpload, signInAsReviewer } = await import('./speed/archive.mjs');
  const { startService } = await import('./service.mjs');
  const { measureBrowserTone } = await import('./speed/browser.mjs');
  const { measureLive } = await import('./speed/live.mjs');

  const parts = new Set(
    chosenParts(['fft', 'tone', 'programme', 'findings', 'large', 'browser', 'upload', 'list', 'live']),
  );
  const folder = mkdtempSync(path.join(tmpdir(), 'benchlark-speed-'));
  const figures = { node: process.version, cpu: cpus()[0]?.model, cores: cpus().length };
  try {
    if (parts.has('fft')) figures.fft = await measureFft();
    if (parts.has('tone')) figures.tone = await measureTone(folder);
    if (parts.has('programme')) figures.programme = await measureProgramme(folder);
    if (parts.has('findings')) figures.findings = await measureFindings();
    const large = path.join(folder, 'large.wav');
    if (['large', 'browser', 'upload', 'list'].some((part) => parts.has(part)))
      await writeTone(large, LARGE_DURATION_S);
    if (parts.has('large')) figures.large = await measureLargeTone(large);
    if (parts.has('browser')) {
      ensureDebian('command -v chromium', ['chromium'], 'the benchmark in a browser');
      figures.browser = await measureBrowserTone(large);
    }
    if (parts.has('upload') || parts.has('list') || parts.has('live')) {
      const { adminUrl } = await startCluster();
      const service = await startService({ adminUrl, env: { DEMO: 'true' }, seed: 'demo/seed.js' });
      try {
        const call = await signInAsReviewer(service);
        if (parts.has('upload')) figures.upload = await measureUpload(service, call, large);
        if (parts.has('list')) figures.list = await measureList(service, call);
        if (parts.has('live')) {
          ensureDebian('command -v chromium', ['chromium'], 'the benchmark of the Live page');
          figures.live = await measureLive(service);
        }
      } finally {
        await service.stop();
      }
    }
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
  console.log(`\n${JSON.stringify(figures)}`);
}

main().catch((error) => {
  console.error(`benchlark: ${error.message}`);
  process.exitCode = 1;
});
