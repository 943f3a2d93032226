import 'reflect-metadata';
import { BenchService } from './bench/bench.service';
import { createApp } from './create-app';
import { endGracefully } from './common/graceful-shutdown';
import { readEnv } from './config/env.schema';
import { runMigrations } from './database/run-migrations';

async function main(): Promise<void> {
  const env = readEnv();
  await runMigrations(env);
  const app = await createApp(env);
  endGracefully(app, env);
  await app.listen(env.PORT, env.HOST);
  const secret = await app.get(BenchService).makeSetupSecret();
  if (secret !== null) {
    process.stdout.write(
      `Nobody has an account yet. One-time secret for the first administrator: ${secret}\n`,
    );
  }
  process.stdout.write(`Benchlark listens on ${await app.getUrl()} for ${env.PUBLIC_URL}\n`);
}

main().catch((error: unknown) => {
  // One plain line: whoever starts the server reads this, not a stack.
  process.stderr.write(
    `benchlark: ${error instanceof Error ? error.message || error.name : String(error)}\n`,
  );
  process.exit(1);
});
