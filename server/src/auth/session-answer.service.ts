import { Inject, Injectable } from '@nestjs/common';
import type { Response } from 'express';
import { HIGHEST_RATE_HZ, LOWEST_RATE_HZ, MOST_CHANNELS } from '@benchlark/dsp';
import { BenchService } from '../bench/bench.service';
import type { AppRequest } from '../common/actor';
import { ENV } from '../config/env.module';
import type { Env } from '../config/env.schema';
import { DEMO_ACCOUNTS } from '../demo/demo-accounts';
import { keepsMailLocally } from '../mail/keeps-mail-locally';
import { PeopleService } from '../people/people.service';
import { CsrfService } from './csrf.service';
import type { LimitsDto, SessionDto } from './dto/session.dto';
import { SessionCookie } from './sessions/session-cookie';
import { SessionsService } from './sessions/sessions.service';

const ACCEPTED_SAMPLE_FORMATS = ['8, 16, 24 and 32 bit PCM', '32 and 64 bit float'];

type SessionEnv = Pick<Env, 'DEMO' | 'SMTP_URL' | 'NODE_ENV' | 'MAX_UPLOAD_BYTES'>;

/** Tells a browser who it is here, and gives it the token that its next changes must carry. */
@Injectable()
export class SessionAnswer {
  constructor(
    @Inject(ENV) private readonly env: SessionEnv,
    private readonly bench: BenchService,
    private readonly people: PeopleService,
    private readonly sessions: SessionsService,
    private readonly cookie: SessionCookie,
    private readonly csrf: CsrfService,
  ) {}

  /** For a request as it came; an anonymous browser is given something to be told apart by. */
  async describe(request: AppRequest, response: Response): Promise<SessionDto> {
    const token = this.cookie.read(request);
    if (request.person && token !== null) {
      return this.#answer(request.person.id, this.csrf.tokenForSession(token));
    }
    const visitor = this.cookie.readVisitor(request) ?? this.cookie.writeVisitor(response);
    return this.#answer(null, this.csrf.tokenForVisitor(visitor));
  }

  /** Opens a session, always a new one, and answers with it. */
  async signIn(request: AppRequest, response: Response, personId: string): Promise<SessionDto> {
    const before = request.person?.sessionId;
    if (before) await this.sessions.end(before);
    const token = await this.sessions.open(personId, (request.get('user-agent') ?? '').slice(0, 300));
    this.cookie.write(response, token);
    return this.#answer(personId, this.csrf.tokenForSession(token));
  }

  async #answer(personId: string | null, csrfToken: string): Promise<SessionDto> {
    const { name, isFirstRun } = await this.bench.describe();
    return {
      person: personId === null ? null : await this.people.get(personId),
      csrfToken,
      firstRun: isFirstRun,
      benchName: name,
      demo: this.env.DEMO
        ? { accounts: DEMO_ACCOUNTS.map((account) => ({ ...account, roles: [...account.roles] })) }
        : null,
      hasMailPage: keepsMailLocally(this.env),
      limits: this.#limits(),
    };
  }

  #limits(): LimitsDto {
    return {
      maxUploadBytes: this.env.MAX_UPLOAD_BYTES,
      acceptedSampleFormats: ACCEPTED_SAMPLE_FORMATS,
      minSampleRateHz: LOWEST_RATE_HZ,
      maxSampleRateHz: HIGHEST_RATE_HZ,
      maxChannels: MOST_CHANNELS,
    };
  }
}
