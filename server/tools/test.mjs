// npm test: everything a change must pass. Its last line is `N passed, N failed`.
//   npm test -- --only dsp,server     runs some of the steps
import { spawnSync } from 'node:child_process';
import { mkdirSync, readFileSync, rmSync } from 'node:fs';
import path from 'node:path';
import { destroyCluster, startCluster } from './postgres.mjs';
import { build, installPackages } from './setup.mjs';
import { ROOT, RUN_DIR, ensureDebian } from './workspace.mjs';

const REPORTS = path.join(RUN_DIR, 'reports');

function runCommand(command, args, { cwd = ROOT, env = {} } = {}) {
  return spawnSync(command, args, { cwd, stdio: 'inherit', env: { ...process.env, ...env } }).status === 0;
}

/** A step that passes or fails as a whole. */
const whole =
  (...args) =>
  () =>
    runCommand('npx', ['--no-install', ...args]) ? { passed: 1, failed: 0 } : { passed: 0, failed: 1 };

/** A step that a test runner counts: Vitest and Jest write the same summary. */
function counted(name, command, args, options) {
  const report = path.join(REPORTS, `${name}.json`);
  rmSync(report, { force: true });
  const isGood = runCommand('npx', ['--no-install', command, ...args(report)], options);
  let summary;
  try {
    summary = JSON.parse(readFileSync(report, 'utf8'));
  } catch (error) {
    console.error(`${name}: the runner left no report (${error.message})`);
    return { passed: 0, failed: 1 };
  }
  const { numPassedTests: passed, numFailedTests, numPendingTests = 0, numTodoTests = 0 } = summary;
  // A test that was skipped, and a file that could not be run, count as failed: neither has shown anything.
  const failed = numFailedTests + numPendingTests + numTodoTests;
  return { passed, failed: failed === 0 && !isGood ? 1 : failed };
}

const vitest =
  (workspace, name = workspace, args = []) =>
  () =>
    counted(
      name,
      'vitest',
      (report) => ['run', ...args, '--reporter=default', '--reporter=json', `--outputFile.json=${report}`],
      { cwd: path.join(ROOT, workspace), env: { TEST_DATABASE_URL: testDatabaseUrl } },
    );

let testDatabaseUrl = '';

/** Write WAV files that are not our own. */
const PUBLIC_TOOLS = ['sox', 'ffmpeg', 'sndfile-programs'];

/** Play and record through the operating system. */
const SOUND_TOOLS = ['pulseaudio', 'pulseaudio-utils'];

const STEPS = {
  format: whole('prettier', '--check', '--log-level', 'warn', '.'),
  lint: whole('eslint', '.', '--max-warnings', '0'),
  types: whole('tsc', '-b'),
  dsp: vitest('dsp'),
  app: vitest('app'),
  server: () =>
    counted('server', 'jest', (report) => ['--json', `--outputFile=${report}`, '--maxWorkers=2'], {
      cwd: path.join(ROOT, 'server'),
      env: { TEST_DATABASE_URL: testDatabaseUrl },
    }),
  e2e: vitest('app', 'e2e', ['--config', 'vitest.e2e.config.ts']),
  sound: vitest('app', 'sound', ['--config', 'vitest.sound.config.ts']),
};

function chosenSteps() {
  const flag = process.argv.indexOf('--only');
  if (flag < 0) return Object.keys(STEPS);
  const names = (process.argv[flag + 1] ?? '').split(',');
  const unknown = names.filter((name) => !(name in STEPS));
  if (unknown.length > 0)
    throw new Error(`no such step: ${unknown.join(', ')}; there are ${Object.keys(STEPS).join(', ')}`);
  return names;
}

async function prepare(steps) {
  await installPackages();
  mkdirSync(REPORTS, { recursive: true });
  await build();
  const isInBrowser = steps.includes('e2e') || steps.includes('sound');
  if (steps.includes('server') || isInBrowser) {
    testDatabaseUrl = (await startCluster({ isTest: true })).adminUrl;
  }
  if (isInBrowser) {
    ensureDebian('command -v chromium', ['chromium'], 'the end-to-end tests');
    ensureDebian(
      'command -v sox && command -v ffmpeg && command -v sndfile-convert',
      PUBLIC_TOOLS,
      'the end-to-end tests',
    );
  }
  if (steps.includes('sound')) {
    ensureDebian('command -v pulseaudio && command -v pactl', SOUND_TOOLS, 'the tests through the system');
  }
}

async function main() {
  const steps = chosenSteps();
  await prepare(steps);
  const totals = { passed: 0, failed: 0 };
  try {
    for (const name of steps) {
      const startedMs = performance.now();
      console.log(`\n== ${name}`);
      const { passed, failed } = STEPS[name]();
      totals.passed += passed;
      totals.failed += failed;
      const seconds = ((performance.now() - startedMs) / 1000).toFixed(0);
      console.log(`== ${name}: ${passed} passed, ${failed} failed (${seconds} s)`);
    }
  } finally {
    if (testDatabaseUrl !== '') await destroyCluster({ isTest: true });
  }
  return totals;
}

main().then(
  ({ passed, failed }) => {
    console.log(`${passed} passed, ${failed} failed`);
    process.exitCode = failed === 0 && passed > 0 ? 0 : 1;
  },
  (error) => {
    console.error(`benchlark: ${error.message}`);
    console.log('0 passed, 1 failed');
    process.exitCode = 1;
  },
);
