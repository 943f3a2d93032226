import { createHmac, timingSafeEqual } from 'node:crypto';
import { Inject, Injectable } from '@nestjs/common';
import type { AppRequest } from '../common/actor';
import { ENV } from '../config/env.module';
import { isLoopbackHost, type Env } from '../config/env.schema';
import { deriveKey } from './derive-key';
import { SessionCookie } from './sessions/session-cookie';

export const CSRF_HEADER = 'x-csrf-token';
const SAFE_METHODS = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * Refuses what another site's page makes a browser send.
 *
 * A token bound to the session by HMAC, and besides the browser's own word on where a request comes from
 * (Fetch Metadata, Origin): OWASP's cheat sheet on cross-site request forgery.
 */
@Injectable()
export class CsrfService {
  readonly #key: Buffer;
  readonly #publicUrl: URL;

  constructor(
    @Inject(ENV) env: Pick<Env, 'SESSION_SECRET' | 'PUBLIC_URL'>,
    private readonly cookie: SessionCookie,
  ) {
    this.#key = deriveKey(env.SESSION_SECRET, 'csrf');
    this.#publicUrl = new URL(env.PUBLIC_URL);
  }

  tokenForSession(sessionToken: string): string {
    return this.#sign(`session:${sessionToken}`);
  }

  tokenForVisitor(visitor: string): string {
    return this.#sign(`visitor:${visitor}`);
  }

  /** @param sessionToken - of a session that holds; null for an anonymous request */
  isAllowed(request: AppRequest, sessionToken: string | null): boolean {
    if (SAFE_METHODS.has(request.method)) return true;
    return this.#isFromOwnPage(request) && hasExpectedBody(request) && this.#hasToken(request, sessionToken);
  }

  #hasToken(request: AppRequest, sessionToken: string | null): boolean {
    const given = request.get(CSRF_HEADER);
    const visitor = this.cookie.readVisitor(request);
    const expected =
      sessionToken !== null
        ? this.tokenForSession(sessionToken)
        : visitor !== null
          ? this.tokenForVisitor(visitor)
          : undefined;
    return given !== undefined && expected !== undefined && isEqual(given, expected);
  }

  #isFromOwnPage(request: AppRequest): boolean {
    const site = request.get('sec-fetch-site');
    if (site !== undefined && site !== 'same-origin' && site !== 'none') return false;
    const origin = request.get('origin');
    return origin === undefined || this.#isOwnOrigin(origin);
  }

  #isOwnOrigin(origin: string): boolean {
    if (origin === this.#publicUrl.origin) return true;
    if (!URL.canParse(origin)) return false;
    // On this machine the same page has several names: localhost, 127.0.0.1, [::1].
    const { protocol, hostname, port } = new URL(origin);
    const isLoopback = isLoopbackHost(hostname) && isLoopbackHost(this.#publicUrl.hostname);
    return isLoopback && protocol === this.#publicUrl.protocol && port === this.#publicUrl.port;
  }

  #sign(text: string): string {
    return createHmac('sha256', this.#key).update(text).digest('base64url');
  }
}

/** A form of another site can send text/plain or url-encoded bodies without asking first; the app never does. */
function hasExpectedBody(request: AppRequest): boolean {
  const type = request.get('content-type');
  return type === undefined || /^(application\/json|multipart\/form-data)\s*(;|$)/i.test(type);
}

function isEqual(given: string, expected: string): boolean {
  const [a, b] = [Buffer.from(given), Buffer.from(expected)];
  return a.length === b.length && timingSafeEqual(a, b);
}
