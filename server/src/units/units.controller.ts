import { Body, Controller, Get, Param, Patch, Post, Query } from '@nestjs/common';
import { ApiCreatedResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { IdPipe } from '../common/id.pipe';
import { Roles } from '../common/roles';
import { ConditionDto, UnitDetailDto, UnitDto, UnitListDto } from './dto/unit.dto';
import {
  CreateConditionDto,
  CreateUnitDto,
  ListUnitsQuery,
  UpdateConditionDto,
  UpdateUnitDto,
} from './dto/write-unit.dto';
import { ConditionsService } from './conditions.service';
import { UnitsService } from './units.service';

@ApiTags('units')
@Controller()
export class UnitsController {
  constructor(
    private readonly units: UnitsService,
    private readonly conditions: ConditionsService,
  ) {}

  @Get('units')
  @Roles('technician', 'reviewer', 'administrator')
  @ApiOkResponse({ type: UnitListDto })
  listUnits(@Query() query: ListUnitsQuery): Promise<UnitListDto> {
    return this.units.list(query);
  }

  @Post('units')
  @Roles('technician', 'reviewer')
  @ApiCreatedResponse({ type: UnitDto })
  createUnit(@Body() body: CreateUnitDto): Promise<UnitDto> {
    return this.units.create(body);
  }

  @Get('units/:id')
  @Roles('technician', 'reviewer', 'administrator')
  @ApiOkResponse({ type: UnitDetailDto })
  getUnit(@Param('id', IdPipe) id: string): Promise<UnitDetailDto> {
    return this.units.get(id);
  }

  @Patch('units/:id')
  @Roles('technician', 'reviewer')
  @ApiOkResponse({ type: UnitDetailDto })
  updateUnit(@Param('id', IdPipe) id: string, @Body() body: UpdateUnitDto): Promise<UnitDetailDto> {
    return this.units.update(id, body);
  }

  @Post('units/:id/conditions')
  @Roles('technician', 'reviewer')
  @ApiCreatedResponse({ type: ConditionDto })
  createCondition(@Param('id', IdPipe) id: string, @Body() body: CreateConditionDto): Promise<ConditionDto> {
    return this.conditions.create(id, body);
  }

  @Patch('conditions/:id')
  @Roles('technician', 'reviewer')
  @ApiOkResponse({ type: ConditionDto })
  updateCondition(@Param('id', IdPipe) id: string, @Body() body: UpdateConditionDto): Promise<ConditionDto> {
    return this.conditions.update(id, body);
  }
}
