import { Inject, Injectable } from '@nestjs/common';
import { JwtService } from '@nestjs/jwt';
import type { CookieOptions, Response } from 'express';
import { z } from 'zod';
import type { AppRequest } from '../../common/actor';
import { ENV } from '../../config/env.module';
import type { Env } from '../../config/env.schema';
import { deriveKey } from '../derive-key';
import { createOpaqueToken } from '../opaque-token';

const ALGORITHM = 'HS256';
const ISSUER = 'benchlark';
const AUDIENCE = 'benchlark-session';

/** All that the cookie says: which session. Who that is, and whether it still holds, the session's row knows. */
const payloadSchema = z.object({ sid: z.string().min(40).max(60), exp: z.number(), iat: z.number() });

/**
 * Writes and reads the two cookies.
 *
 * Behind https both have the `__Host-` prefix and `Secure`. Plain http is allowed by the configuration for the loopback
 * address only; Chromium would take `Secure` and the prefix there too (tried with version 150), but not every browser
 * and no command-line client does, so both are left out.
 */
@Injectable()
export class SessionCookie {
  readonly sessionName: string;
  readonly #visitorName: string;
  readonly #options: CookieOptions;
  readonly #key: Buffer;
  readonly #lifeS: number;

  constructor(
    @Inject(ENV) env: Pick<Env, 'PUBLIC_URL' | 'SESSION_SECRET' | 'SESSION_ABSOLUTE_HOURS'>,
    private readonly jwt: JwtService,
  ) {
    const isHttps = env.PUBLIC_URL.startsWith('https:');
    const prefix = isHttps ? '__Host-' : '';
    this.sessionName = `${prefix}benchlark`;
    this.#visitorName = `${prefix}benchlark-visitor`;
    this.#options = { httpOnly: true, secure: isHttps, sameSite: 'lax', path: '/' };
    this.#key = deriveKey(env.SESSION_SECRET, 'session-cookie');
    this.#lifeS = env.SESSION_ABSOLUTE_HOURS * 3600;
  }

  write(response: Response, token: string): void {
    const value = this.jwt.sign(
      { sid: token },
      { secret: this.#key, algorithm: ALGORITHM, issuer: ISSUER, audience: AUDIENCE, expiresIn: this.#lifeS },
    );
    response.cookie(this.sessionName, value, { ...this.#options, maxAge: this.#lifeS * 1000 });
  }

  clear(response: Response): void {
    response.clearCookie(this.sessionName, this.#options);
  }

  /** The session's opaque token, or null when there is no cookie or not one of ours (RFC 8725: one algorithm, all claims). */
  read(request: AppRequest): string | null {
    const value = readCookie(request, this.sessionName);
    if (value === null) return null;
    try {
      const payload: unknown = this.jwt.verify(value, {
        secret: this.#key,
        algorithms: [ALGORITHM],
        issuer: ISSUER,
        audience: AUDIENCE,
      });
      return payloadSchema.parse(payload).sid;
    } catch {
      return null; // a forged, foreign or expired cookie is the same as none
    }
  }

  /** What an anonymous browser is told apart by, so that its CSRF token can be bound to something. */
  readVisitor(request: AppRequest): string | null {
    const value = readCookie(request, this.#visitorName);
    return value !== null && /^[\w-]{43}$/.test(value) ? value : null;
  }

  writeVisitor(response: Response): string {
    const visitor = createOpaqueToken();
    response.cookie(this.#visitorName, visitor, this.#options);
    return visitor;
  }
}

function readCookie(request: AppRequest, name: string): string | null {
  const cookies = request.cookies as Record<string, unknown>;
  const value = cookies[name];
  return typeof value === 'string' && value !== '' ? value : null;
}
