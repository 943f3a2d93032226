import { Body, Controller, Delete, Get, HttpCode, Param, Post, Req, Res } from '@nestjs/common';
import { ApiCreatedResponse, ApiNoContentResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import type { Response } from 'express';
import { addressKey, AttemptsService } from '../auth/attempts/attempts.service';
import { SessionDto } from '../auth/dto/session.dto';
import { SessionAnswer } from '../auth/session-answer.service';
import { actorOf, CurrentActor, type Actor, type AppRequest } from '../common/actor';
import { IdPipe } from '../common/id.pipe';
import { Public, Roles, SessionOnly } from '../common/roles';
import {
  AcceptInvitationDto,
  CreateInvitationDto,
  InvitationListDto,
  InvitationLookDto,
  LookAtInvitationDto,
  MadeInvitationDto,
} from './dto/invitation.dto';
import { InvitationsService } from './invitations.service';

@ApiTags('people')
@SessionOnly()
@Controller('invitations')
export class InvitationsController {
  constructor(
    private readonly invitations: InvitationsService,
    private readonly answer: SessionAnswer,
    private readonly attempts: AttemptsService,
  ) {}

  /** The invitations that still hold. */
  @Get()
  @Roles('administrator')
  @ApiOkResponse({ type: InvitationListDto })
  async listInvitations(): Promise<InvitationListDto> {
    return { items: await this.invitations.list() };
  }

  /** Makes a link, and mails it where an address is given and mails can be sent. */
  @Post()
  @Roles('administrator')
  @ApiCreatedResponse({ type: MadeInvitationDto })
  createInvitation(
    @CurrentActor() actor: Actor,
    @Body() body: CreateInvitationDto,
  ): Promise<MadeInvitationDto> {
    return this.invitations.create(actor, body);
  }

  @Delete(':id')
  @HttpCode(204)
  @Roles('administrator')
  @ApiNoContentResponse()
  async revokeInvitation(@CurrentActor() actor: Actor, @Param('id', IdPipe) id: string): Promise<void> {
    await this.invitations.revoke(actor, id);
  }

  /** What a link invites to. In the body, so that no log keeps the token. */
  @Post('look')
  @HttpCode(200)
  @Public()
  @ApiOkResponse({ type: InvitationLookDto })
  async lookAtInvitation(
    @CurrentActor() actor: Actor,
    @Body() { token }: LookAtInvitationDto,
  ): Promise<InvitationLookDto> {
    await this.attempts.assertFree(addressKey('invitation', actor.ip));
    return this.invitations.look(token);
  }

  @Post('accept')
  @Public()
  @ApiCreatedResponse({ type: SessionDto })
  async acceptInvitation(
    @Req() request: AppRequest,
    @Res({ passthrough: true }) response: Response,
    @Body() body: AcceptInvitationDto,
  ): Promise<SessionDto> {
    const actor = actorOf(request);
    const address = addressKey('invitation', actor.ip);
    await this.attempts.begin(address);
    const { id } = await this.invitations.accept(actor, body);
    await this.attempts.takeBack(address);
    return this.answer.signIn(request, response, id);
  }
}
