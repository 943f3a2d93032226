import { Injectable, Module } from '@nestjs/common';
import { APP_GUARD } from '@nestjs/core';
import { ThrottlerGuard, ThrottlerModule, type ThrottlerLimitDetail } from '@nestjs/throttler';
import type { ExecutionContext } from '@nestjs/common';
import { ENV } from '../config/env.module';
import type { Env } from '../config/env.schema';
import { AppError } from './app-error';

const MINUTE_MS = 60_000;

/** Answers a flood as every other expected failure is answered. */
@Injectable()
export class RequestThrottleGuard extends ThrottlerGuard {
  protected override throwThrottlingException(
    _: ExecutionContext,
    { timeToBlockExpire, timeToExpire }: ThrottlerLimitDetail,
  ): Promise<void> {
    throw new AppError('TOO_MANY_REQUESTS', { retryAfterS: timeToBlockExpire || timeToExpire });
  }
}

/**
 * Keeps one address from taking the server for itself: far above what pages and uploads need, counted in this process.
 * What is worth guessing at (sign-in, resets, invitations, set-up) is counted in the database besides, and much lower.
 */
@Module({
  imports: [
    ThrottlerModule.forRootAsync({
      inject: [ENV],
      useFactory: (env: Pick<Env, 'REQUESTS_PER_MINUTE'>) => ({
        throttlers: [{ ttl: MINUTE_MS, limit: env.REQUESTS_PER_MINUTE }],
        // One count an address, whatever the route.
        generateKey: (_context, tracker) => tracker,
      }),
    }),
  ],
  providers: [{ provide: APP_GUARD, useClass: RequestThrottleGuard }],
})
export class RequestThrottleModule {}
