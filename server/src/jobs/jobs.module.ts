import { Module } from '@nestjs/common';
import { AnalysisRequests } from './analysis-requests.service';
import { JobsController } from './jobs.controller';
import { JobsService } from './jobs.service';

@Module({
  controllers: [JobsController],
  providers: [AnalysisRequests, JobsService],
  exports: [AnalysisRequests],
})
export class JobsModule {}
