import type { Request, Response } from 'express';

const LINGER_MS = 2_000;

/**
 * Answers a request whose body is still arriving so that the sender gets to read the answer.
 *
 * Closing at once would reset the connection and take the answer with it; reading on to the end would take in a body
 * that is refused. So the rest is thrown away for a moment, then the connection is closed.
 */
export function lingerAfterAnswer(request: Request, response: Response): void {
  response.once('finish', () => {
    if (request.complete || request.destroyed) return;
    request.resume();
    const timer = setTimeout(() => request.destroy(), LINGER_MS);
    request.once('close', () => clearTimeout(timer));
  });
}
