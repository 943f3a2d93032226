import { SetMetadata } from '@nestjs/common';

export const ROLES = ['technician', 'reviewer', 'peer', 'administrator', 'reader'] as const;
export type Role = (typeof ROLES)[number];

export const ACCESS_RULE = Symbol('ACCESS_RULE');
export const SESSION_ONLY = Symbol('SESSION_ONLY');

/** What a route asks for; a route without a rule is refused to everybody. */
export type AccessRule = { kind: 'public' } | { kind: 'roles'; roles: readonly Role[] };

/** Anybody may call the route; unsafe methods still need the CSRF token. */
export const Public = () => SetMetadata(ACCESS_RULE, { kind: 'public' } satisfies AccessRule);

/** People who hold at least one of these roles may call the route. */
export const Roles = (...roles: [Role, ...Role[]]) =>
  SetMetadata(ACCESS_RULE, { kind: 'roles', roles } satisfies AccessRule);

/** Every signed-in person may call the route. */
export const SignedIn = () => Roles(...ROLES);

/** The route (or every route of the controller) can't be called with an API token: it could give away the account. */
export const SessionOnly = () => SetMetadata(SESSION_ONLY, true);
