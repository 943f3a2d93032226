import { Inject, Injectable } from '@nestjs/common';
import * as argon2 from 'argon2';
import { AppError } from '../../common/app-error';
import { ENV } from '../../config/env.module';
import type { Env } from '../../config/env.schema';
import { createOpaqueToken } from '../opaque-token';

type HasherEnv = Pick<Env, 'ARGON2_MEMORY_KIB' | 'ARGON2_TIME_COST' | 'ARGON2_PARALLELISM'>;

/** Each takes 64 MiB and a core for a tenth of a second: more at once would starve everybody else. */
const AT_ONCE_MAX = 2;
/** Some five seconds of waiting; whoever comes later is told to come back. */
const WAITING_MAX = 60;
const RETRY_AFTER_S = 5;

/** Hashes and checks passwords with argon2id, at most two at once. */
@Injectable()
export class PasswordHasher {
  readonly #options: argon2.Options;
  readonly #waiting: (() => void)[] = [];
  #runningCount = 0;
  #dummyHash: Promise<string> | undefined;

  constructor(@Inject(ENV) env: HasherEnv) {
    this.#options = {
      type: argon2.argon2id,
      memoryCost: env.ARGON2_MEMORY_KIB,
      timeCost: env.ARGON2_TIME_COST,
      parallelism: env.ARGON2_PARALLELISM,
    };
  }

  hash(password: string): Promise<string> {
    return this.#limited(() => argon2.hash(normalise(password), this.#options));
  }

  verify(hash: string, password: string): Promise<boolean> {
    return this.#limited(() => argon2.verify(hash, normalise(password)));
  }

  /** Takes as long as a real check and never succeeds: an unknown address must not answer faster. */
  async verifyNothing(password: string): Promise<false> {
    this.#dummyHash ??= this.hash(createOpaqueToken());
    await this.verify(await this.#dummyHash, password);
    return false;
  }

  /** True when the hash was made with other settings than today's. */
  isOutdated(hash: string): boolean {
    return !hash.startsWith('$argon2id$') || argon2.needsRehash(hash, this.#options);
  }

  async #limited<T>(work: () => Promise<T>): Promise<T> {
    if (this.#runningCount >= AT_ONCE_MAX) {
      if (this.#waiting.length >= WAITING_MAX)
        throw new AppError('UNAVAILABLE', { retryAfterS: RETRY_AFTER_S });
      await new Promise<void>((resolve) => this.#waiting.push(resolve));
    } else {
      this.#runningCount++;
    }
    try {
      return await work();
    } finally {
      // The place goes straight to the next in the queue, or is given back.
      const next = this.#waiting.shift();
      if (next) next();
      else this.#runningCount--;
    }
  }
}

/** One spelling of characters that look and type the same (NIST SP 800-63B asks for a normalisation). */
function normalise(password: string): string {
  return password.normalize('NFC');
}
