import type { Server } from 'node:http';
import type { INestApplication } from '@nestjs/common';
import type { Env } from '../config/env.schema';
import { ShutdownState } from './shutdown-state';

/**
 * Ends the process on SIGTERM or SIGINT: not ready at once, running requests are finished until the deadline, then cut.
 * A second signal ends it on the spot.
 */
export function endGracefully(app: INestApplication, env: Pick<Env, 'SHUTDOWN_DEADLINE_MS'>): void {
  const state = app.get(ShutdownState);
  const server = app.getHttpServer() as Server;
  const end = async (): Promise<void> => {
    state.begin();
    const deadline = setTimeout(() => server.closeAllConnections(), env.SHUTDOWN_DEADLINE_MS);
    // A kept-alive connection turns idle only after its answer; they are closed as they do.
    const sweep = setInterval(() => server.closeIdleConnections(), 100);
    try {
      await app.close();
    } finally {
      clearTimeout(deadline);
      clearInterval(sweep);
    }
  };
  const onSignal = (): void => {
    if (state.isShuttingDown) process.exit(1);
    end().then(
      () => process.exit(0),
      () => process.exit(1),
    );
  };
  process.on('SIGTERM', onSignal);
  process.on('SIGINT', onSignal);
}
