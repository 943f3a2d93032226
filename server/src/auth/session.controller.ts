import { Body, Controller, Delete, Get, HttpCode, Post, Req, Res } from '@nestjs/common';
import { ApiCreatedResponse, ApiNoContentResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import type { Response } from 'express';
import { AuditService } from '../audit/audit.service';
import { actorOf, type AppRequest } from '../common/actor';
import { Public, SessionOnly, SignedIn } from '../common/roles';
import { SessionDto, SignInDto } from './dto/session.dto';
import { SessionAnswer } from './session-answer.service';
import { SessionCookie } from './sessions/session-cookie';
import { SessionsService } from './sessions/sessions.service';
import { SignInService } from './sign-in.service';

@ApiTags('session')
@Controller('session')
export class SessionController {
  constructor(
    private readonly answer: SessionAnswer,
    private readonly signInService: SignInService,
    private readonly sessions: SessionsService,
    private readonly cookie: SessionCookie,
    private readonly audit: AuditService,
  ) {}

  /** Who is signed in, and what a page must know about this bench. */
  @Get()
  @Public()
  @ApiOkResponse({ type: SessionDto })
  getSession(
    @Req() request: AppRequest,
    @Res({ passthrough: true }) response: Response,
  ): Promise<SessionDto> {
    return this.answer.describe(request, response);
  }

  @Post()
  @Public()
  @ApiCreatedResponse({ type: SessionDto })
  async signIn(
    @Req() request: AppRequest,
    @Res({ passthrough: true }) response: Response,
    @Body() body: SignInDto,
  ): Promise<SessionDto> {
    const { id } = await this.signInService.check(actorOf(request), body);
    return this.answer.signIn(request, response, id);
  }

  @Delete()
  @HttpCode(204)
  @SignedIn()
  @SessionOnly()
  @ApiNoContentResponse()
  async signOut(@Req() request: AppRequest, @Res({ passthrough: true }) response: Response): Promise<void> {
    const sessionId = request.person?.sessionId;
    if (sessionId) await this.sessions.end(sessionId);
    this.cookie.clear(response);
    await this.audit.record(actorOf(request), { action: 'session.closed' });
  }
}
