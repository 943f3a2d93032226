import { createParamDecorator, type ExecutionContext } from '@nestjs/common';
import type { Request } from 'express';
import type { Role } from './roles';

/** The person behind a request, as the database had it when the request arrived. */
export interface SignedInPerson {
  readonly id: string;
  readonly displayName: string;
  readonly email: string;
  readonly roles: readonly Role[];
  /** The session's row, or null when an API token was used. */
  readonly sessionId: string | null;
  /** The API token's row, or null when a session was used. */
  readonly apiTokenId: string | null;
}

/** Who does something, and from where: what the audit trail wants to know. */
export interface Actor {
  readonly person: SignedInPerson | null;
  readonly ip: string;
  readonly requestId: string;
  readonly userAgent: string;
}

/** An Express request after the request-id middleware and the access guard. */
export interface AppRequest extends Request {
  id: string;
  person?: SignedInPerson;
}

const USER_AGENT_LENGTH_MAX = 300;

export function actorOf(request: AppRequest): Actor {
  return {
    person: request.person ?? null,
    ip: request.ip ?? 'unknown',
    requestId: request.id,
    userAgent: (request.get('user-agent') ?? '').slice(0, USER_AGENT_LENGTH_MAX),
  };
}

/** Route parameter: who asks, from where. */
export const CurrentActor = createParamDecorator((_: unknown, context: ExecutionContext): Actor =>
  actorOf(context.switchToHttp().getRequest<AppRequest>()),
);

/** Route parameter: the signed-in person; only on routes that are not public. */
export const CurrentPerson = createParamDecorator((_: unknown, context: ExecutionContext): SignedInPerson => {
  const { person } = context.switchToHttp().getRequest<AppRequest>();
  if (!person) throw new Error('CurrentPerson stands on a public route');
  return person;
});
