import { Body, Controller, HttpCode, Post } from '@nestjs/common';
import { ApiAcceptedResponse, ApiNoContentResponse, ApiTags } from '@nestjs/swagger';
import { CurrentActor, type Actor } from '../../common/actor';
import { AppError } from '../../common/app-error';
import { Public } from '../../common/roles';
import { PeopleService } from '../../people/people.service';
import { accountKey, addressKey, AttemptsService } from '../attempts/attempts.service';
import { AskPasswordResetDto, CompletePasswordResetDto } from './password-resets.dto';
import { PasswordResetsService } from './password-resets.service';

/** Every answer takes at least this long, so that a known address can't be told from an unknown one by the time. */
const ANSWER_TIME_MIN_MS = 150;

const wait = (timeMs: number) => new Promise<void>((resolve) => setTimeout(resolve, timeMs));

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
    await Promise.all([this.#askQuietly(actor, email), wait(ANSWER_TIME_MIN_MS)]);
  }

  async #askQuietly(actor: Actor, email: string): Promise<void> {
    try {
      await this.attempts.begin(accountKey('reset', email));
    } catch (error) {
      // Nobody's mailbox is flooded; the answer stays what it always is.
      if (error instanceof AppError && error.code === 'TOO_MANY_REQUESTS') return;
      throw error;
    }
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
