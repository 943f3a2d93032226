import { AppError } from './app-error';

/** The place in an ordered list after which the next page begins: the sort value as text, and the tie-breaker. */
export interface Cursor {
  readonly order: string;
  readonly value: string;
  readonly tie: string;
}

export function writeCursor({ order, value, tie }: Cursor): string {
  return Buffer.from(JSON.stringify([order, value, tie])).toString('base64url');
}

/**
 * @param order - what the list is ordered by now
 * @param isValid - whether value and tie can be what the list gave out
 * @throws AppError VALIDATION_FAILED when it is no cursor, or one of another order
 */
export function readCursor(
  text: string,
  order: string,
  isValid: (value: string, tie: string) => boolean,
): { value: string; tie: string } {
  const refused = new AppError('VALIDATION_FAILED', {
    fields: { cursor: ['is not a cursor of this list in this order'] },
  });
  let parts: unknown;
  try {
    parts = JSON.parse(Buffer.from(text, 'base64url').toString('utf8'));
  } catch {
    throw refused;
  }
  if (!Array.isArray(parts) || parts.length !== 3) throw refused;
  const [from, value, tie] = parts as unknown[];
  const isText = typeof value === 'string' && typeof tie === 'string' && !value.includes('\0');
  if (from !== order || !isText || !isValid(value, tie)) throw refused;
  return { value, tie };
}

const UUID = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/;

export const isUuid = (text: string) => UUID.test(text);
