import { Controller, Get, Res } from '@nestjs/common';
import { ApiOkResponse, ApiServiceUnavailableResponse, ApiTags } from '@nestjs/swagger';
import type { Response } from 'express';
import { Public } from '../common/roles';
import { LiveDto, ReadyDto } from './dto/health.dto';
import { HealthService } from './health.service';

@ApiTags('health')
@Controller('health')
export class HealthController {
  constructor(private readonly health: HealthService) {}

  /** The process runs; says nothing of what it depends on. */
  @Get('live')
  @Public()
  @ApiOkResponse({ type: LiveDto })
  getLive(): LiveDto {
    return { status: 'ok' };
  }

  /** The process can serve: 503 with the component's name when it can't. */
  @Get('ready')
  @Public()
  @ApiOkResponse({ type: ReadyDto })
  @ApiServiceUnavailableResponse({ type: ReadyDto })
  async getReady(@Res({ passthrough: true }) response: Response): Promise<ReadyDto> {
    const ready = await this.health.ready();
    if (ready.status !== 'ready') response.status(503);
    return ready;
  }
}
