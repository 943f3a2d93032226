import type { Env } from '../config/env.schema';

/** Without a mail server of its own, a development or demo bench keeps its mails on a page instead of sending them. */
export function keepsMailLocally(env: Pick<Env, 'SMTP_URL' | 'NODE_ENV' | 'DEMO'>): boolean {
  return env.SMTP_URL === undefined && (env.NODE_ENV !== 'production' || env.DEMO);
}
