import { Module } from '@nestjs/common';
import { JobsModule } from '../jobs/jobs.module';
import { RigsModule } from '../rigs/rigs.module';
import { CaptureFilesController } from './capture-files.controller';
import { CaptureListService } from './capture-list.service';
import { CapturesController } from './captures.controller';
import { CapturesService } from './captures.service';
import { FilingService } from './filing.service';

@Module({
  imports: [JobsModule, RigsModule],
  controllers: [CapturesController, CaptureFilesController],
  providers: [CapturesService, CaptureListService, FilingService],
  exports: [CaptureListService],
})
export class CapturesModule {}
