import { Injectable, type CanActivate, type ExecutionContext } from '@nestjs/common';
import { Reflector } from '@nestjs/core';
import { AuditService } from '../audit/audit.service';
import { actorOf, type AppRequest, type SignedInPerson } from '../common/actor';
import { AppError } from '../common/app-error';
import { ACCESS_RULE, SESSION_ONLY, type AccessRule } from '../common/roles';
import { ApiTokensService } from './api-tokens/api-tokens.service';
import { CsrfService } from './csrf.service';
import { SessionCookie } from './sessions/session-cookie';
import { SessionsService } from './sessions/sessions.service';

const PATH_LENGTH_MAX = 200;

interface Identification {
  readonly person: SignedInPerson | null;
  readonly csrfBinding: { readonly sessionToken: string | null } | null;
}

/** The one place that decides who may call a route: nobody, unless the route says so. */
@Injectable()
export class AccessGuard implements CanActivate {
  constructor(
    private readonly reflector: Reflector,
    private readonly sessions: SessionsService,
    private readonly apiTokens: ApiTokensService,
    private readonly cookie: SessionCookie,
    private readonly csrf: CsrfService,
    private readonly audit: AuditService,
  ) {}

  async canActivate(context: ExecutionContext): Promise<boolean> {
    const request = context.switchToHttp().getRequest<AppRequest>();
    const targets = [context.getHandler(), context.getClass()];
    const rule = this.reflector.getAllAndOverride<AccessRule | undefined>(ACCESS_RULE, targets);

    const { person, csrfBinding } = await this.#identify(request);
    if (person) request.person = person;
    if (!person && rule?.kind !== 'public') throw new AppError('SIGNED_OUT');
    if (csrfBinding && !this.csrf.isAllowed(request, csrfBinding.sessionToken)) {
      if (person) await this.#recordRefusal(request, 'access.forgery-refused');
      throw new AppError('CSRF_REFUSED');
    }
    if (!person || rule?.kind === 'public') return true;
    const isSessionOnly =
      this.reflector.getAllAndOverride<boolean | undefined>(SESSION_ONLY, targets) === true;
    const hasRole = rule !== undefined && rule.roles.some((role) => person.roles.includes(role));
    if (hasRole && !(isSessionOnly && person.sessionId === null)) return true;
    await this.#recordRefusal(request, 'access.denied');
    throw new AppError('NOT_ALLOWED');
  }

  /**
   * @returns who asks, and for requests with cookies what their CSRF token must be bound to
   * @throws AppError SIGNED_OUT for a bearer token that is not valid
   */
  async #identify(request: AppRequest): Promise<Identification> {
    const authorization = request.get('authorization');
    if (authorization !== undefined) {
      // No browser sends this by itself, so there is nothing to forge; the cookie does not count beside it.
      const token = /^Bearer (\S+)$/i.exec(authorization)?.[1];
      const person = token === undefined ? null : await this.apiTokens.find(token);
      if (!person) throw new AppError('SIGNED_OUT', { detail: 'The API token is not valid.' });
      return { person, csrfBinding: null };
    }
    const token = this.cookie.read(request);
    const person = token === null ? null : await this.sessions.find(token);
    return { person, csrfBinding: { sessionToken: person ? token : null } };
  }

  async #recordRefusal(request: AppRequest, action: string): Promise<void> {
    const detail = `${request.method} ${request.path.slice(0, PATH_LENGTH_MAX)}`;
    await this.audit.record(actorOf(request), { action, detail });
  }
}
