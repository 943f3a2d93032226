const CSRF_HEADER = 'x-csrf-token';
const SAFE_METHODS = new Set(['GET', 'HEAD', 'OPTIONS']);

let csrfToken: string | null = null;

/** Kept in memory only: the page's own script is the one that may know it. */
export function rememberCsrfToken(token: string): void {
  csrfToken = token;
}

export function forgetCsrfToken(): void {
  csrfToken = null;
}

/** The token for this session, asked of the server when this page does not have it yet. */
export async function currentCsrfToken(): Promise<string> {
  if (csrfToken !== null) return csrfToken;
  const response = await fetch(new Request(new URL('/api/session', location.origin)));
  const session: unknown = await response.json();
  const token =
    typeof session === 'object' && session !== null && 'csrfToken' in session ? session.csrfToken : null;
  if (typeof token !== 'string') throw new TypeError('the session has no token for writing');
  rememberCsrfToken(token);
  return token;
}

/**
 * Sends a request with the token that shows it comes from this page. A token that the server no longer takes
 * (the session was renewed in another tab) is fetched anew, once.
 */
export async function fetchWithCsrf(request: Request): Promise<Response> {
  if (SAFE_METHODS.has(request.method)) return fetch(request);
  const retry = request.clone();
  const response = await fetch(await withToken(request));
  if (response.status !== 403 || !(await isCsrfRefusal(response))) return response;
  forgetCsrfToken();
  return fetch(await withToken(retry));
}

async function withToken(request: Request): Promise<Request> {
  request.headers.set(CSRF_HEADER, await currentCsrfToken());
  return request;
}

async function isCsrfRefusal(response: Response): Promise<boolean> {
  const body: unknown = await response
    .clone()
    .json()
    .catch(() => null);
  return typeof body === 'object' && body !== null && 'code' in body && body.code === 'CSRF_REFUSED';
}
