import { Module } from '@nestjs/common';
import { JobsModule } from '../jobs/jobs.module';
import { RigsModule } from '../rigs/rigs.module';
import { RecordsController } from './records.controller';
import { RecordsService } from './records.service';
import { VerificationService } from './verification.service';

@Module({
  imports: [JobsModule, RigsModule],
  controllers: [RecordsController],
  providers: [RecordsService, VerificationService],
})
export class RecordsModule {}
