import { Body, Controller, Get, Post } from '@nestjs/common';
import { ApiCreatedResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { Roles } from '../common/roles';
import { CreateRigDto, RigDto, RigListDto } from './dto/rig.dto';
import { RigsService } from './rigs.service';

@ApiTags('rigs')
@Controller('rigs')
export class RigsController {
  constructor(private readonly rigs: RigsService) {}

  @Get()
  @Roles('technician', 'reviewer', 'administrator')
  @ApiOkResponse({ type: RigListDto })
  async listRigs(): Promise<RigListDto> {
    return { items: await this.rigs.list() };
  }

  @Post()
  @Roles('technician', 'reviewer')
  @ApiCreatedResponse({ type: RigDto })
  createRig(@Body() body: CreateRigDto): Promise<RigDto> {
    return this.rigs.create(body);
  }
}
