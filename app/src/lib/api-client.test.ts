import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { api, unwrap } from './api-client';
import { forgetCsrfToken, rememberCsrfToken } from './csrf';
import { onSignedOut } from './session-events';

const fetchMock = vi.fn<(request: Request) => Promise<Response>>();

function problem(status: number, body: object, headers: Record<string, string> = {}): Response {
  return new Response(JSON.stringify(body), {
    status,
    headers: { 'content-type': 'application/problem+json', ...headers },
  });
}

function json(body: object): Response {
  return new Response(JSON.stringify(body), { headers: { 'content-type': 'application/json' } });
}

describe('the API client', () => {
  beforeEach(() => {
    vi.stubGlobal('fetch', fetchMock);
    rememberCsrfToken('first');
  });
  afterEach(() => {
    vi.unstubAllGlobals();
    fetchMock.mockReset();
    forgetCsrfToken();
  });

  it('gives the body of a good answer', async () => {
    fetchMock.mockResolvedValueOnce(json({ items: [] }));
    await expect(unwrap(api.GET('/api/rigs'))).resolves.toEqual({ items: [] });
    expect(fetchMock.mock.calls[0]![0].headers.has('x-csrf-token')).toBe(false);
  });

  it('turns a problem document into an error with its code, offset, remedy and fields', async () => {
    fetchMock.mockResolvedValueOnce(
      problem(422, {
        title: 'The recording cannot be read',
        code: 'WAV_UNREADABLE',
        detail: 'The data chunk is missing.',
        offset: 36,
        found: 'LIST',
        remedy: 'Export it again.',
        fields: { note: ['too long'] },
      }),
    );
    await expect(unwrap(api.GET('/api/rigs'))).rejects.toMatchObject({
      status: 422,
      code: 'WAV_UNREADABLE',
      message: 'The data chunk is missing.',
      facts: { offset: 36, found: 'LIST', remedy: 'Export it again.', fields: { note: ['too long'] } },
    });
  });

  it('says so when the server does not answer, or answers with something else', async () => {
    fetchMock.mockRejectedValueOnce(new TypeError('Failed to fetch'));
    await expect(unwrap(api.GET('/api/rigs'))).rejects.toMatchObject({ status: 0, code: 'NO_ANSWER' });
    fetchMock.mockResolvedValueOnce(new Response('<h1>Bad gateway</h1>', { status: 502 }));
    await expect(unwrap(api.GET('/api/rigs'))).rejects.toMatchObject({ status: 502, code: 'NOT_UNDERSTOOD' });
  });

  it('tells how long to wait when it was asked too often', async () => {
    fetchMock.mockResolvedValueOnce(
      problem(429, { title: 'Slowly', code: 'TOO_MANY_REQUESTS' }, { 'retry-after': '30' }),
    );
    await expect(unwrap(api.GET('/api/rigs'))).rejects.toMatchObject({ facts: { retryAfterS: 30 } });
  });

  it('announces an ended session once for each refused request', async () => {
    const listener = vi.fn();
    const leave = onSignedOut(listener);
    fetchMock.mockResolvedValueOnce(problem(401, { title: 'Signed out', code: 'SIGNED_OUT' }));
    await expect(unwrap(api.GET('/api/rigs'))).rejects.toMatchObject({ code: 'SIGNED_OUT' });
    expect(listener).toHaveBeenCalledOnce();
    leave();
  });

  it('sends the token when it writes, and fetches a new one when the old is refused', async () => {
    fetchMock.mockResolvedValueOnce(problem(403, { title: 'No', code: 'CSRF_REFUSED' }));
    fetchMock.mockResolvedValueOnce(json({ csrfToken: 'second' }));
    fetchMock.mockResolvedValueOnce(json({ id: 'r1' }));
    await unwrap(api.POST('/api/rigs', { body: { name: 'Attic' } }));

    const [first, session, second] = fetchMock.mock.calls.map(([request]) => request);
    expect(first!.headers.get('x-csrf-token')).toBe('first');
    expect(new URL(session!.url).pathname).toBe('/api/session');
    expect(second!.headers.get('x-csrf-token')).toBe('second');
    expect(await second!.json()).toEqual({ name: 'Attic' });
  });

  it('does not try a second time when the refusal has another reason', async () => {
    fetchMock.mockResolvedValueOnce(problem(403, { title: 'No', code: 'NOT_ALLOWED' }));
    await expect(unwrap(api.POST('/api/rigs', { body: { name: 'Attic' } }))).rejects.toMatchObject({
      code: 'NOT_ALLOWED',
    });
    expect(fetchMock).toHaveBeenCalledOnce();
  });
});
