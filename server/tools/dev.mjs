// npm run dev: all three workspaces with hot reload. The page is served by Vite, which hands /api to the server.
import { mkdirSync } from 'node:fs';
import path from 'node:path';
import concurrently from 'concurrently';
import { startCluster, stopCluster } from './postgres.mjs';
import { setup } from './setup.mjs';
import { ROOT, RUN_DIR, runShown } from './workspace.mjs';

async function main() {
  await setup();
  const isOwnCluster = !process.env.DATABASE_URL;
  const databaseUrl = isOwnCluster ? (await startCluster()).url : process.env.DATABASE_URL;
  const env = {
    NODE_ENV: 'development',
    DATABASE_URL: databaseUrl,
    STORE_DIR: path.join(RUN_DIR, 'store'),
    DEMO: 'true',
    LOG_LEVEL: process.env.LOG_LEVEL ?? 'warn',
    // The page's address, so that links in mails and the origin check fit what the browser shows.
    PUBLIC_URL: 'http://127.0.0.1:4871',
  };
  mkdirSync(env.STORE_DIR, { recursive: true });
  try {
    runShown(process.execPath, ['server/dist/database/migrate.js'], { env: { ...process.env, ...env } });
    runShown(process.execPath, ['server/dist/demo/seed.js'], { env: { ...process.env, ...env } });
    const { result } = concurrently(
      [
        { name: 'dsp', command: 'tsc -p dsp/tsconfig.build.json --watch --preserveWatchOutput' },
        { name: 'tsc', command: 'tsc -p server/tsconfig.build.json --watch --preserveWatchOutput' },
        { name: 'server', command: 'node --watch --watch-preserve-output server/dist/main.js', env },
        { name: 'worker', command: 'node --watch --watch-preserve-output server/dist/worker.js', env },
        {
          name: 'app',
          command: 'vite',
          cwd: path.join(ROOT, 'app'),
          env: { ...env, BENCHLARK_SERVER_URL: 'http://127.0.0.1:4870' },
        },
      ],
      { cwd: ROOT, killOthersOn: ['failure', 'success'], prefix: 'name' },
    );
    // Ending with Ctrl-C makes every command end with a signal: that is no failure of this script.
    await result.catch(() => undefined);
  } finally {
    if (isOwnCluster) await stopCluster();
  }
}

main().catch((error) => {
  console.error(`benchlark: ${error.message}`);
  process.exitCode = 1;
});
