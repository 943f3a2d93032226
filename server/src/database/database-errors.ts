import { QueryFailedError } from 'typeorm';

/** Node's network errors and PostgreSQL's codes for "not now": https://www.postgresql.org/docs/15/errcodes-appendix.html */
const UNAVAILABLE_CODES = new Set([
  'ECONNREFUSED',
  'ECONNRESET',
  'EPIPE',
  'ETIMEDOUT',
  'ENOTFOUND',
  '53300', // too many connections
  '57P01', // admin shutdown
  '57P02', // crash shutdown
  '57P03', // cannot connect now
]);
/** node-postgres gives these no code. */
const UNAVAILABLE_MESSAGES =
  /^(Connection terminated|Query read timeout|timeout exceeded when trying to connect|timeout expired|Client has encountered a connection error|Driver not Connected|Connection with .+ not established)/i;

function codeOf(error: unknown): unknown {
  const own = (error as { code?: unknown }).code;
  if (own !== undefined || !(error instanceof QueryFailedError)) return own;
  return (error.driverError as { code?: unknown }).code;
}

/** True when the database can't be reached or doesn't answer, as opposed to refusing a statement. */
export function isDatabaseUnavailable(error: unknown): boolean {
  // By shape, not by class: Node's own network errors can come from another realm than ours.
  if (typeof error !== 'object' || error === null) return false;
  const { errors, message } = error as { errors?: unknown; message?: unknown };
  if (Array.isArray(errors)) return errors.some(isDatabaseUnavailable);
  const code = codeOf(error);
  if (typeof code === 'string' && (UNAVAILABLE_CODES.has(code) || code.startsWith('08'))) return true;
  return typeof message === 'string' && UNAVAILABLE_MESSAGES.test(message);
}

/** True when a statement broke the named unique constraint. */
export function isUniqueViolation(error: unknown, constraint: string): boolean {
  if (!(error instanceof QueryFailedError)) return false;
  const { code, constraint: name } = error.driverError as { code?: unknown; constraint?: unknown };
  return code === '23505' && name === constraint;
}
