import { Body, Controller, HttpCode, Post } from '@nestjs/common';
import { ApiAcceptedResponse, ApiNoContentResponse, ApiTags } from '@nestjs/swagger';
import { CurrentActor, type Actor } from '../../common/actor';
import { Public } from '../../common/roles';
import { PeopleService } from '../../people/people.service';
import { accountKey, addressKey, AttemptsService } from '../attempts/attempts.service';
import { AskPasswordResetDto, CompletePasswordResetDto } from './password-resets.dto';
import { PasswordResetsService } from './password-resets.service';

@ApiTags('session')
@Controller('password-resets')
export class PasswordResetsController {
  constructor(
    private readonly people: PeopleService,
    private readonly resets: PasswordResetsService,
    private readonly attempts: AttemptsService,
  ) {}

  /** Mails a link to whoever has that address here. The answer never tells whether somebody has. */
  @Post()
  @HttpCode(202)
  @Public()
  @ApiAcceptedResponse()
  async askPasswordReset(
    @CurrentActor() actor: Actor,
    @Body() { email }: AskPasswordResetDto,
  ): Promise<void> {
    await this.attempts.begin(addressKey('reset', actor.ip));
    await this.attempts.begin(accountKey('reset', email));
    const person = await this.people.findByEmail(email);
    if (person && !person.isDisabled) await this.resets.askFor(actor, person);
  }

  @Post('complete')
  @HttpCode(204)
  @Public()
  @ApiNoContentResponse()
  async completePasswordReset(
    @CurrentActor() actor: Actor,
    @Body() { token, password }: CompletePasswordResetDto,
  ): Promise<void> {
    await this.attempts.begin(addressKey('reset-link', actor.ip));
    await this.resets.complete(actor, token, password);
  }
}
