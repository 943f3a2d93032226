import { Inject, Injectable, Logger, type OnApplicationShutdown, type OnModuleInit } from '@nestjs/common';
import { Client } from 'pg';
import { Subject, type Observable } from 'rxjs';
import { ENV } from '../config/env.module';
import type { Env } from '../config/env.schema';
import { CAPTURE_CHANNEL, type CaptureEvent } from '../jobs/job-queue';

const RECONNECT_MS = 1_000;

/** What workers announce, handed on to whoever listens in this process. */
@Injectable()
export class CaptureEvents implements OnModuleInit, OnApplicationShutdown {
  readonly #logger = new Logger('CaptureEvents');
  readonly #events = new Subject<CaptureEvent>();
  #client: Client | null = null;
  #timer: NodeJS.Timeout | undefined;
  #isEnding = false;

  constructor(@Inject(ENV) private readonly env: Env) {}

  get all(): Observable<CaptureEvent> {
    return this.#events;
  }

  async onModuleInit(): Promise<void> {
    await this.connect();
  }

  async onApplicationShutdown(): Promise<void> {
    this.#isEnding = true;
    clearTimeout(this.#timer);
    this.#events.complete();
    await this.#client?.end();
  }

  /** LISTEN needs a connection of its own; when that is lost it is made again until it stands. */
  private async connect(): Promise<void> {
    const client = new Client({
      connectionString: this.env.DATABASE_URL,
      application_name: 'benchlark-events',
      keepAlive: true,
      connectionTimeoutMillis: 3_000,
    });
    client.on('notification', ({ payload }) => {
      if (payload) this.#events.next(JSON.parse(payload) as CaptureEvent); // only our own code notifies here
    });
    client.on('error', (error) => this.#logger.warn(`listening was interrupted: ${error.message}`));
    client.on('end', () => this.reconnectSoon(client));
    try {
      await client.connect();
      await client.query(`LISTEN ${CAPTURE_CHANNEL}`);
      this.#client = client;
    } catch (error) {
      this.#logger.warn(`can't listen yet: ${error instanceof Error ? error.message : String(error)}`);
      this.reconnectSoon(client);
    }
  }

  private reconnectSoon(client: Client): void {
    if (this.#isEnding || this.#timer) return;
    client.removeAllListeners('end');
    this.#timer = setTimeout(() => {
      this.#timer = undefined;
      void this.connect();
    }, RECONNECT_MS);
    this.#timer.unref();
  }
}
