import { Global, Module } from '@nestjs/common';
import { BenchService } from './bench.service';
import { SetupController } from './setup.controller';

@Global()
@Module({ controllers: [SetupController], providers: [BenchService], exports: [BenchService] })
export class BenchModule {}
