import { Global, Module } from '@nestjs/common';
import { BenchService } from './bench.service';
import { FirstRunGuard } from './first-run.guard';
import { SetupController } from './setup.controller';

@Global()
@Module({ controllers: [SetupController], providers: [BenchService, FirstRunGuard], exports: [BenchService] })
export class BenchModule {}
