import type { RequestHandler } from 'express';
import { AppError } from './app-error';
import type { AppRequest } from './actor';
import { writeProblem } from './problem.filter';

/**
 * Cuts off a small body that trickles in: 408 after the time.
 *
 * Multipart bodies are left to the upload route, which takes as long as an honest slow line needs and watches for stalls.
 */
export function limitBodyTime(timeMs: number): RequestHandler {
  return (request, response, next) => {
    const hasBody =
      request.headers['transfer-encoding'] !== undefined || Number(request.headers['content-length']) > 0;
    if (!hasBody || request.is('multipart/form-data')) {
      next();
      return;
    }
    const timer = setTimeout(() => {
      if (request.complete || response.headersSent) return;
      response.setHeader('Connection', 'close');
      writeProblem(response, (request as AppRequest).id, new AppError('REQUEST_TIMEOUT'));
      response.once('finish', () => request.destroy());
    }, timeMs);
    timer.unref();
    request.once('close', () => clearTimeout(timer));
    response.once('close', () => clearTimeout(timer));
    next();
  };
}
