import { Global, Module } from '@nestjs/common';
import { TerminusModule } from '@nestjs/terminus';
import { HealthController } from './health.controller';
import { HealthService } from './health.service';
import { ReadinessRegistry } from './readiness-registry';

@Global()
@Module({
  imports: [TerminusModule.forRoot({ logger: false })],
  controllers: [HealthController],
  providers: [HealthService, ReadinessRegistry],
  exports: [ReadinessRegistry],
})
export class HealthModule {}
