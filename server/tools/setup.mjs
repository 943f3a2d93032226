// npm run setup: packages, PostgreSQL, builds. Does only what has changed since the last time.
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { ensurePostgres } from './postgres.mjs';
import { ROOT, RUN_DIR, onceFor, runShown } from './workspace.mjs';

const CONFIG = ['package-lock.json', 'tsconfig.base.json'];

function checkNode() {
  const [major, minor] = process.versions.node.split('.').map(Number);
  if (major < 20 || (major === 20 && minor < 19)) {
    throw new Error(`Benchlark needs Node 20.19 or newer; this is ${process.version}.`);
  }
}

export async function installPackages() {
  checkNode();
  const modules = path.join(ROOT, 'node_modules');
  await onceFor(path.join(modules, '.benchlark-stamp'), ['package-lock.json'], modules, () => {
    console.log('Installing packages ...');
    runShown('npm', ['ci', '--no-audit', '--no-fund']);
  });
}

const stamp = (name) => path.join(RUN_DIR, 'stamps', name);
const workspaceFiles = (name) =>
  ['src', 'package.json', 'tsconfig.json', 'tsconfig.build.json'].map((file) => `${name}/${file}`);

export async function build() {
  const dsp = workspaceFiles('dsp');
  const steps = [
    { name: 'dsp', inputs: [...dsp, ...CONFIG], result: 'dsp/dist/index.js' },
    {
      name: 'server',
      inputs: [...workspaceFiles('server'), ...dsp, ...CONFIG],
      result: 'server/dist/main.js',
    },
    {
      name: 'app',
      inputs: [
        ...workspaceFiles('app'),
        'app/index.html',
        'app/public',
        'app/vite.config.ts',
        ...dsp,
        ...CONFIG,
      ],
      result: 'app/dist/index.html',
    },
  ];
  for (const { name, inputs, result } of steps) {
    await onceFor(stamp(name), inputs, path.join(ROOT, result), () => {
      console.log(`Building ${name} ...`);
      runShown('npm', ['run', '--silent', 'build', '-w', name]);
    });
  }
}

export async function setup() {
  await installPackages();
  if (!process.env.DATABASE_URL) ensurePostgres();
  await build();
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  setup().then(
    () => console.log('Set up.'),
    (error) => {
      console.error(`benchlark: ${error.message}`);
      process.exitCode = 1;
    },
  );
}
