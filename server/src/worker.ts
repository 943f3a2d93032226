import 'reflect-metadata';
import { NestFactory } from '@nestjs/core';
import { Logger } from 'nestjs-pino';
import { readEnv } from './config/env.schema';
import { runMigrations } from './database/run-migrations';
import { WorkerRunner } from './jobs/worker-runner';
import { WorkerModule } from './worker.module';

/** `node server/dist/worker.js`: takes analyses from the queue until SIGTERM. */
async function main(): Promise<void> {
  const env = readEnv();
  await runMigrations(env);
  const app = await NestFactory.createApplicationContext(WorkerModule.with(env), { bufferLogs: true });
  app.useLogger(app.get(Logger));
  const runner = app.get(WorkerRunner);
  await runner.start();
  process.stdout.write('Benchlark worker is ready\n');

  let isEnding = false;
  const end = async (): Promise<void> => {
    const deadline = setTimeout(() => process.exit(1), env.SHUTDOWN_DEADLINE_MS);
    deadline.unref();
    await runner.stop();
    await app.close();
  };
  const onSignal = (): void => {
    if (isEnding) process.exit(1);
    isEnding = true;
    end().then(
      () => process.exit(0),
      () => process.exit(1),
    );
  };
  process.on('SIGTERM', onSignal);
  process.on('SIGINT', onSignal);
  await runner.ended();
  if (!isEnding) throw new Error('the queue ended by itself');
}

main().catch((error: unknown) => {
  process.stderr.write(
    `benchlark: ${error instanceof Error ? error.message || error.name : String(error)}\n`,
  );
  process.exit(1);
});
