import { Injectable, Logger, ServiceUnavailableException, type OnModuleInit } from '@nestjs/common';
import { HealthCheckService, HealthIndicatorService, type HealthIndicatorFunction } from '@nestjs/terminus';
import { DataSource } from 'typeorm';
import { ShutdownState } from '../common/shutdown-state';
import type { ReadyDto } from './dto/health.dto';
import { ReadinessRegistry, type ReadinessCheck } from './readiness-registry';

/** Shorter than the two seconds after which whoever asks should have an answer. */
const CHECK_TIME_MAX_MS = 1_500;

async function withinTime(check: ReadinessCheck): Promise<void> {
  let timer: NodeJS.Timeout | undefined;
  const late = new Promise<never>((_, reject) => {
    timer = setTimeout(
      () => reject(new Error(`no answer within ${CHECK_TIME_MAX_MS} ms`)),
      CHECK_TIME_MAX_MS,
    );
  });
  try {
    await Promise.race([check(), late]);
  } finally {
    clearTimeout(timer);
  }
}

@Injectable()
export class HealthService implements OnModuleInit {
  readonly #logger = new Logger('Health');

  constructor(
    private readonly terminus: HealthCheckService,
    private readonly indicators: HealthIndicatorService,
    private readonly registry: ReadinessRegistry,
    private readonly shutdown: ShutdownState,
    private readonly dataSource: DataSource,
  ) {}

  onModuleInit(): void {
    this.registry.add('database', async () => {
      await this.dataSource.query('SELECT 1');
    });
  }

  async ready(): Promise<ReadyDto> {
    const functions = [...this.registry.checks].map(([name, check]) => this.#toIndicator(name, check));
    const details = await this.#run(functions);
    const components = Object.fromEntries(
      Object.entries(details).map(([name, { status }]) => [name, status === 'up' ? 'up' : 'down'] as const),
    );
    const isUp = Object.values(components).every((status) => status === 'up');
    if (this.shutdown.isShuttingDown) return { status: 'shutting-down', components };
    return { status: isUp ? 'ready' : 'not-ready', components };
  }

  async #run(functions: HealthIndicatorFunction[]): Promise<Record<string, { status: string }>> {
    try {
      return (await this.terminus.check(functions)).details;
    } catch (error) {
      // Terminus reports a component that is down as an exception with the same body.
      if (!(error instanceof ServiceUnavailableException)) throw error;
      return (error.getResponse() as { details: Record<string, { status: string }> }).details;
    }
  }

  #toIndicator(name: string, check: ReadinessCheck): HealthIndicatorFunction {
    return async () => {
      const indicator = this.indicators.check(name);
      try {
        await withinTime(check);
        return indicator.up();
      } catch (error) {
        this.#logger.warn({ component: name, err: error });
        return indicator.down();
      }
    };
  }
}
