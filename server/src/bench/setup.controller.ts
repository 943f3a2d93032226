import { Body, Controller, Post, Req, Res, UseGuards } from '@nestjs/common';
import { ApiCreatedResponse, ApiNotFoundResponse, ApiTags } from '@nestjs/swagger';
import type { Response } from 'express';
import { addressKey, AttemptsService } from '../auth/attempts/attempts.service';
import { SessionDto } from '../auth/dto/session.dto';
import { SessionAnswer } from '../auth/session-answer.service';
import { actorOf, type AppRequest } from '../common/actor';
import { Public } from '../common/roles';
import { BenchService } from './bench.service';
import { SetupDto } from './dto/setup.dto';
import { FirstRunGuard } from './first-run.guard';

@ApiTags('session')
@Controller('setup')
export class SetupController {
  constructor(
    private readonly bench: BenchService,
    private readonly answer: SessionAnswer,
    private readonly attempts: AttemptsService,
  ) {}

  /** Makes the first administrator of an empty bench, who is signed in at once. */
  @Post()
  @Public()
  @UseGuards(FirstRunGuard)
  @ApiCreatedResponse({ type: SessionDto })
  @ApiNotFoundResponse({ description: 'This bench has been set up' })
  async setUp(
    @Req() request: AppRequest,
    @Res({ passthrough: true }) response: Response,
    @Body() body: SetupDto,
  ): Promise<SessionDto> {
    const actor = actorOf(request);
    await this.attempts.begin(addressKey('setup', actor.ip));
    const { id } = await this.bench.setUp(actor, body);
    return this.answer.signIn(request, response, id);
  }
}
