/** Messages per field path, as the server's validation gives them. */
export type FieldErrors = Readonly<Record<string, readonly string[]>>;

export interface ProblemFacts {
  readonly title: string;
  readonly detail?: string;
  readonly requestId?: string;
  /** Byte of the file where it went wrong. */
  readonly offset?: number;
  /** What stood there. */
  readonly found?: string;
  readonly remedy?: string;
  /** A more exact code than the error's own, such as the reader's. */
  readonly reason?: string;
  readonly fields?: FieldErrors;
  readonly retryAfterS?: number;
}

/** Codes that arise on this side of the wire. */
export const NO_ANSWER = 'NO_ANSWER';
export const NOT_UNDERSTOOD = 'NOT_UNDERSTOOD';

/** A request that failed. Pages branch on `code`, never on the text. */
export class ApiError extends Error {
  readonly status: number;
  readonly code: string;
  readonly facts: ProblemFacts;

  constructor(status: number, code: string, facts: ProblemFacts) {
    super(facts.detail ?? facts.title);
    this.name = 'ApiError';
    this.status = status;
    this.code = code;
    this.facts = facts;
  }
}

/** The server could not be reached, or the answer broke off. */
export function noAnswer(): ApiError {
  return new ApiError(0, NO_ANSWER, {
    title: 'The server does not answer',
    detail:
      'The server does not answer. Nothing that was stored is lost; check the connection and try again.',
  });
}

/**
 * Reads an RFC 9457 problem document.
 *
 * @param body - the parsed JSON, of whatever shape
 * @returns an error that always has a code and a title
 */
export function toApiError(status: number, body: unknown, headers?: Headers): ApiError {
  const retryAfterS = Number(headers?.get('retry-after'));
  const retry = Number.isFinite(retryAfterS) && retryAfterS > 0 ? { retryAfterS } : {};
  if (!isRecord(body)) {
    return new ApiError(status, NOT_UNDERSTOOD, {
      title: 'The server gave an answer that this page does not understand',
      ...retry,
    });
  }
  return new ApiError(status, text(body['code']) ?? NOT_UNDERSTOOD, {
    title: text(body['title']) ?? 'The request failed',
    detail: text(body['detail']),
    requestId: text(body['requestId']),
    offset: typeof body['offset'] === 'number' ? body['offset'] : undefined,
    found: text(body['found']),
    remedy: text(body['remedy']),
    reason: text(body['reason']),
    fields: toFieldErrors(body['fields']),
    ...retry,
  });
}

function toFieldErrors(value: unknown): FieldErrors | undefined {
  if (!isRecord(value)) return undefined;
  const entries = Object.entries(value).flatMap(([path, messages]) =>
    Array.isArray(messages)
      ? [[path, messages.filter((message) => typeof message === 'string')] as [string, string[]]]
      : [],
  );
  return Object.fromEntries(entries);
}

function isRecord(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

function text(value: unknown): string | undefined {
  return typeof value === 'string' && value !== '' ? value : undefined;
}
