import { Body, Controller, Get, Param, Patch, Post } from '@nestjs/common';
import { ApiCreatedResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { CurrentActor, type Actor } from '../common/actor';
import { IdPipe } from '../common/id.pipe';
import { Roles } from '../common/roles';
import { LiveSettingsDto } from './dto/live-settings.dto';
import { CreateRigDto, RigDto, RigListDto, UpdateRigDto } from './dto/rig.dto';
import { RigSettingsService } from './rig-settings.service';
import { RigsService } from './rigs.service';

@ApiTags('rigs')
@Controller('rigs')
export class RigsController {
  constructor(
    private readonly rigs: RigsService,
    private readonly settings: RigSettingsService,
  ) {}

  @Get()
  @Roles('technician', 'reviewer', 'administrator')
  @ApiOkResponse({ type: RigListDto })
  async listRigs(): Promise<RigListDto> {
    return { items: await this.rigs.list() };
  }

  @Post()
  @Roles('technician', 'reviewer')
  @ApiCreatedResponse({ type: RigDto })
  createRig(@Body() body: CreateRigDto, @CurrentActor() actor: Actor): Promise<RigDto> {
    return this.rigs.create(body, actor);
  }

  @Get(':id')
  @Roles('technician', 'reviewer', 'administrator')
  @ApiOkResponse({ type: RigDto })
  getRig(@Param('id', IdPipe) id: string): Promise<RigDto> {
    return this.rigs.get(id);
  }

  @Patch(':id')
  @Roles('technician', 'reviewer')
  @ApiOkResponse({ type: RigDto })
  updateRig(
    @Param('id', IdPipe) id: string,
    @Body() body: UpdateRigDto,
    @CurrentActor() actor: Actor,
  ): Promise<RigDto> {
    return this.rigs.update(id, body, actor);
  }

  /** Calibrations and baselines that are in force today, as settings embed them. */
  @Get(':id/live-settings')
  @Roles('technician', 'reviewer', 'administrator')
  @ApiOkResponse({ type: LiveSettingsDto })
  getLiveSettings(@Param('id', IdPipe) id: string): Promise<LiveSettingsDto> {
    return this.settings.live(id);
  }
}
