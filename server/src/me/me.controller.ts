import { Body, Controller, Delete, Get, HttpCode, Param, Patch, Post } from '@nestjs/common';
import { ApiCreatedResponse, ApiNoContentResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { AuditService } from '../audit/audit.service';
import type { ApiToken } from '../auth/api-tokens/api-token.entity';
import { ApiTokensService } from '../auth/api-tokens/api-tokens.service';
import { SessionsService } from '../auth/sessions/sessions.service';
import { CurrentActor, CurrentPerson, type Actor, type SignedInPerson } from '../common/actor';
import { AppError } from '../common/app-error';
import { IdPipe } from '../common/id.pipe';
import { SessionOnly, SignedIn } from '../common/roles';
import { PersonDto } from '../people/dto/person.dto';
import { PeopleService } from '../people/people.service';
import {
  ApiTokenDto,
  ChangePasswordDto,
  CreateApiTokenDto,
  MadeApiTokenDto,
  OwnSessionDto,
  UpdateMeDto,
} from './dto/me.dto';
import { MeService } from './me.service';

@ApiTags('me')
@SignedIn()
@SessionOnly()
@Controller('me')
export class MeController {
  constructor(
    private readonly me: MeService,
    private readonly people: PeopleService,
    private readonly sessions: SessionsService,
    private readonly apiTokens: ApiTokensService,
    private readonly audit: AuditService,
  ) {}

  @Get()
  @ApiOkResponse({ type: PersonDto })
  getMe(@CurrentPerson() { id }: SignedInPerson): Promise<PersonDto> {
    return this.people.get(id);
  }

  @Patch()
  @ApiOkResponse({ type: PersonDto })
  updateMe(
    @CurrentPerson() { id }: SignedInPerson,
    @Body() { displayName }: UpdateMeDto,
  ): Promise<PersonDto> {
    return displayName === undefined ? this.people.get(id) : this.people.rename(id, displayName);
  }

  /** Changes the password; every other session ends. */
  @Post('password')
  @HttpCode(204)
  @ApiNoContentResponse()
  async changePassword(
    @CurrentActor() actor: Actor,
    @CurrentPerson() person: SignedInPerson,
    @Body() body: ChangePasswordDto,
  ): Promise<void> {
    await this.me.changePassword(actor, person, body);
  }

  @Get('sessions')
  @ApiOkResponse({ type: [OwnSessionDto] })
  async listSessions(@CurrentPerson() { id, sessionId }: SignedInPerson): Promise<OwnSessionDto[]> {
    const sessions = await this.sessions.list(id);
    return sessions.map((session) => ({
      id: session.id,
      createdAt: session.createdAt.toISOString(),
      lastSeenAt: session.lastSeenAt.toISOString(),
      userAgent: session.userAgent,
      isCurrent: session.id === sessionId,
    }));
  }

  @Delete('sessions/:id')
  @HttpCode(204)
  @ApiNoContentResponse()
  async endSession(
    @CurrentActor() actor: Actor,
    @CurrentPerson() person: SignedInPerson,
    @Param('id', IdPipe) id: string,
  ): Promise<void> {
    if (!(await this.sessions.endOwn(person.id, id))) throw new AppError('NOT_FOUND');
    await this.audit.record(actor, { action: 'session.ended', subject: `session:${id}` });
  }

  @Get('tokens')
  @ApiOkResponse({ type: [ApiTokenDto] })
  async listTokens(@CurrentPerson() { id }: SignedInPerson): Promise<ApiTokenDto[]> {
    return (await this.apiTokens.list(id)).map(toApiTokenDto);
  }

  /** Makes a token for the command line. It is shown this once. */
  @Post('tokens')
  @ApiCreatedResponse({ type: MadeApiTokenDto })
  async createToken(
    @CurrentActor() actor: Actor,
    @CurrentPerson() { id }: SignedInPerson,
    @Body() { name }: CreateApiTokenDto,
  ): Promise<MadeApiTokenDto> {
    const { apiToken, token } = await this.apiTokens.create(id, name);
    await this.audit.record(actor, { action: 'token.made', subject: `token:${apiToken.id}`, detail: name });
    return { ...toApiTokenDto(apiToken), token };
  }

  @Delete('tokens/:id')
  @HttpCode(204)
  @ApiNoContentResponse()
  async removeToken(
    @CurrentActor() actor: Actor,
    @CurrentPerson() person: SignedInPerson,
    @Param('id', IdPipe) id: string,
  ): Promise<void> {
    if (!(await this.apiTokens.remove(person.id, id))) throw new AppError('NOT_FOUND');
    await this.audit.record(actor, { action: 'token.removed', subject: `token:${id}` });
  }
}

function toApiTokenDto({ id, name, createdAt, lastUsedAt }: ApiToken): ApiTokenDto {
  return { id, name, createdAt: createdAt.toISOString(), lastUsedAt: lastUsedAt?.toISOString() ?? null };
}
