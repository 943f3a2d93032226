import { Module, type DynamicModule } from '@nestjs/common';
import { LoggerModule } from 'nestjs-pino';
import { loggerOptions } from './common/logger-options';
import { EnvModule } from './config/env.module';
import type { Env } from './config/env.schema';
import { DatabaseModule } from './database/database.module';
import { AnalysisTask } from './jobs/analysis.task';
import { Heartbeat } from './jobs/heartbeat.service';
import { WorkerRunner } from './jobs/worker-runner';
import { StorageModule } from './storage/storage.module';

/** The job process: no controllers. */
@Module({})
export class WorkerModule {
  static with(env: Env): DynamicModule {
    return {
      module: WorkerModule,
      imports: [EnvModule.with(env), LoggerModule.forRoot(loggerOptions(env)), DatabaseModule, StorageModule],
      providers: [AnalysisTask, Heartbeat, WorkerRunner],
    };
  }
}
