import { Body, Controller, Delete, Get, HttpCode, Param, Post } from '@nestjs/common';
import { ApiCreatedResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { CurrentActor, CurrentPerson, type Actor, type SignedInPerson } from '../common/actor';
import { IdPipe } from '../common/id.pipe';
import { Roles } from '../common/roles';
import { BaselinesService } from './baselines.service';
import { CalibrationsService } from './calibrations.service';
import { BaselineDto, BaselineListDto, CreateBaselineDto } from './dto/baseline.dto';
import { CalibrationDto, CalibrationListDto, CreateCalibrationDto } from './dto/calibration.dto';

/** What figures of a rig refer to: its calibrations and its baselines. */
@ApiTags('rigs')
@Controller('rigs/:id')
export class RigReferencesController {
  constructor(
    private readonly calibrations: CalibrationsService,
    private readonly baselines: BaselinesService,
  ) {}

  @Get('calibrations')
  @Roles('technician', 'reviewer', 'administrator')
  @ApiOkResponse({ type: CalibrationListDto })
  async listCalibrations(@Param('id', IdPipe) id: string): Promise<CalibrationListDto> {
    return { items: await this.calibrations.list(id) };
  }

  @Post('calibrations')
  @Roles('technician', 'reviewer')
  @ApiCreatedResponse({ type: CalibrationDto })
  createCalibration(
    @Param('id', IdPipe) id: string,
    @Body() body: CreateCalibrationDto,
    @CurrentActor() actor: Actor,
    @CurrentPerson() person: SignedInPerson,
  ): Promise<CalibrationDto> {
    return this.calibrations.create(id, body, { actor, person });
  }

  @Post('calibrations/:calibrationId/retire')
  @HttpCode(200)
  @Roles('technician', 'reviewer')
  @ApiOkResponse({ type: CalibrationDto })
  retireCalibration(
    @Param('id', IdPipe) id: string,
    @Param('calibrationId', IdPipe) calibrationId: string,
    @CurrentActor() actor: Actor,
    @CurrentPerson() person: SignedInPerson,
  ): Promise<CalibrationDto> {
    return this.calibrations.retire(id, calibrationId, { actor, person });
  }

  @Get('baselines')
  @Roles('technician', 'reviewer', 'administrator')
  @ApiOkResponse({ type: BaselineListDto })
  async listBaselines(@Param('id', IdPipe) id: string): Promise<BaselineListDto> {
    return { items: await this.baselines.list(id) };
  }

  @Post('baselines')
  @Roles('technician', 'reviewer')
  @ApiCreatedResponse({ type: BaselineDto })
  createBaseline(
    @Param('id', IdPipe) id: string,
    @Body() body: CreateBaselineDto,
    @CurrentActor() actor: Actor,
    @CurrentPerson() person: SignedInPerson,
  ): Promise<BaselineDto> {
    return this.baselines.create(id, body, { actor, person });
  }

  /** Retires the baseline: it stays on the books. */
  @Delete('baselines/:baselineId')
  @Roles('technician', 'reviewer')
  @ApiOkResponse({ type: BaselineDto })
  retireBaseline(
    @Param('id', IdPipe) id: string,
    @Param('baselineId', IdPipe) baselineId: string,
    @CurrentActor() actor: Actor,
    @CurrentPerson() person: SignedInPerson,
  ): Promise<BaselineDto> {
    return this.baselines.retire(id, baselineId, { actor, person });
  }
}
