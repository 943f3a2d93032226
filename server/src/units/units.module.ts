import { Module } from '@nestjs/common';
import { ConditionsService } from './conditions.service';
import { UnitsController } from './units.controller';
import { UnitsService } from './units.service';

@Module({ controllers: [UnitsController], providers: [UnitsService, ConditionsService] })
export class UnitsModule {}
