import createClient from 'openapi-fetch';
import { ApiError, noAnswer, toApiError } from './api-error';
import type { paths } from './api-types';
import { fetchWithCsrf } from './csrf';
import { announceSignedOut } from './session-events';

export const SIGNED_OUT = 'SIGNED_OUT';

/** The server's API, typed by its OpenAPI document. Use it through {@link unwrap}. */
export const api = createClient<paths>({ baseUrl: location.origin, fetch: fetchWithCsrf });

interface Answer<T> {
  data?: T;
  error?: unknown;
  response: Response;
}

/**
 * Waits for an answer and gives its body.
 *
 * @throws ApiError with the server's code, or `NO_ANSWER` when it could not be reached; an `AbortError` as it is
 */
export async function unwrap<T>(request: Promise<Answer<T>>): Promise<T> {
  const { data, error, response } = await request.catch((reason: unknown) => {
    throw isAbort(reason) ? reason : noAnswer();
  });
  if (response.ok) return data as T; // 204 has no body, and its operation's type says so
  throw refuse(response.status, error, response.headers);
}

/** The error for a refused request; tells the page at once when the session has ended. */
export function refuse(status: number, body: unknown, headers?: Headers): ApiError {
  const failure = toApiError(status, parseIfText(body), headers);
  if (failure.code === SIGNED_OUT) announceSignedOut();
  return failure;
}

export function isAbort(reason: unknown): boolean {
  return reason instanceof DOMException && reason.name === 'AbortError';
}

function parseIfText(body: unknown): unknown {
  if (typeof body !== 'string') return body;
  try {
    return JSON.parse(body) as unknown;
  } catch {
    return null; // an answer from something between us and the server; its text is of no use to a person
  }
}
