import { Global, Module } from '@nestjs/common';
import { APP_GUARD } from '@nestjs/core';
import { JwtModule } from '@nestjs/jwt';
import { AccessGuard } from './access.guard';
import { ApiTokensService } from './api-tokens/api-tokens.service';
import { AttemptsService } from './attempts/attempts.service';
import { CsrfService } from './csrf.service';
import { PasswordHasher } from './passwords/password-hasher';
import { SessionCookie } from './sessions/session-cookie';
import { SessionsService } from './sessions/sessions.service';

/** What decides who somebody is and what they may call; its guard stands before every route. */
@Global()
@Module({
  imports: [JwtModule.register({})],
  providers: [
    ApiTokensService,
    AttemptsService,
    CsrfService,
    PasswordHasher,
    SessionCookie,
    SessionsService,
    { provide: APP_GUARD, useClass: AccessGuard },
  ],
  exports: [ApiTokensService, AttemptsService, CsrfService, PasswordHasher, SessionCookie, SessionsService],
})
export class AccessModule {}
