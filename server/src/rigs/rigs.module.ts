import { Module } from '@nestjs/common';
import { BaselinesService } from './baselines.service';
import { CalibrationsService } from './calibrations.service';
import { RigReferencesController } from './rig-references.controller';
import { RigSettingsService } from './rig-settings.service';
import { RigsController } from './rigs.controller';
import { RigsService } from './rigs.service';

@Module({
  controllers: [RigsController, RigReferencesController],
  providers: [RigsService, CalibrationsService, BaselinesService, RigSettingsService],
  exports: [RigSettingsService],
})
export class RigsModule {}
