import { vi } from 'vitest';
import { rememberCsrfToken } from '@/lib/csrf';

type Answer = (request: Request) => Response | Promise<Response>;

/** Stands at the border in the server's place: answers by method and path, and keeps what it was asked. */
export function fakeServer(answers: Readonly<Record<string, Answer>>) {
  const requests: Request[] = [];
  rememberCsrfToken('token');
  vi.stubGlobal('fetch', async (request: Request) => {
    const asked = request.clone();
    requests.push(asked);
    const answer = answers[`${request.method} ${new URL(request.url).pathname}`];
    return answer ? answer(request) : problem(404, { title: 'Nothing here', code: 'NOT_FOUND' });
  });
  return { requests };
}

export function json(body: unknown, status = 200): Response {
  return new Response(JSON.stringify(body), { status, headers: { 'content-type': 'application/json' } });
}

export function problem(status: number, body: object): Response {
  return new Response(JSON.stringify(body), {
    status,
    headers: { 'content-type': 'application/problem+json' },
  });
}
