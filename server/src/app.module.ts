import { Module, type DynamicModule } from '@nestjs/common';
import { LoggerModule } from 'nestjs-pino';
import { AuditModule } from './audit/audit.module';
import { AccessModule } from './auth/access.module';
import { loggerOptions } from './common/logger-options';
import { RequestThrottleModule } from './common/request-throttle.module';
import { ShutdownModule } from './common/shutdown-state';
import { EnvModule } from './config/env.module';
import type { Env } from './config/env.schema';
import { DatabaseModule } from './database/database.module';
import { HealthModule } from './health/health.module';
import { AuthModule } from './auth/auth.module';
import { BenchModule } from './bench/bench.module';
import { InvitationsModule } from './invitations/invitations.module';
import { MailModule } from './mail/mail.module';
import { MeModule } from './me/me.module';
import { PeopleModule } from './people/people.module';
import { CapturesModule } from './captures/captures.module';
import { EventsModule } from './events/events.module';
import { JobsModule } from './jobs/jobs.module';
import { RecordsModule } from './records/records.module';
import { RigsModule } from './rigs/rigs.module';
import { StorageModule } from './storage/storage.module';
import { TodayModule } from './today/today.module';
import { UnitsModule } from './units/units.module';

/** The HTTP process. Feature modules are listed one a line. */
@Module({})
export class AppModule {
  static with(env: Env): DynamicModule {
    return {
      module: AppModule,
      imports: [
        EnvModule.with(env),
        LoggerModule.forRoot(loggerOptions(env)),
        ShutdownModule,
        RequestThrottleModule,
        DatabaseModule,
        HealthModule,
        AuditModule,
        AccessModule,
        MailModule,
        PeopleModule,
        BenchModule,
        AuthModule,
        MeModule,
        InvitationsModule,
        StorageModule,
        UnitsModule,
        RigsModule,
        JobsModule,
        CapturesModule,
        RecordsModule,
        EventsModule,
        TodayModule,
      ],
    };
  }
}
