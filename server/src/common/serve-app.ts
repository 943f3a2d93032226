import { existsSync } from 'node:fs';
import { join } from 'node:path';
import express, { type NextFunction, type Request, type RequestHandler, type Response } from 'express';
import { AppError } from './app-error';
import type { AppRequest } from './actor';
import { writeProblem } from './problem.filter';

const YEAR_MS = 365 * 24 * 3600 * 1000;

/** A path that the app's router may own: no file ending, no dot folder, nothing below the built assets. */
function isPagePath(path: string): boolean {
  return !path.includes('.') && path !== '/assets' && !path.startsWith('/assets/');
}

/**
 * Serves the built app: its files, and its page for every other address that is not the API's.
 *
 * @param directory - the app's build; it may be missing, every page is 404 then
 */
export function serveApp(directory: string): RequestHandler[] {
  const page = join(directory, 'index.html');
  const files = express.static(directory, {
    dotfiles: 'ignore',
    index: false,
    redirect: false,
    setHeaders: (response, path) => {
      // Built assets carry a hash in their name; the page itself must always be asked for.
      const isHashed = path.startsWith(join(directory, 'assets'));
      response.setHeader(
        'Cache-Control',
        isHashed ? `public, max-age=${YEAR_MS / 1000}, immutable` : 'no-cache',
      );
    },
  });
  const isApi = (request: Request) => request.path === '/api' || request.path.startsWith('/api/');
  const isRead = (request: Request) => request.method === 'GET' || request.method === 'HEAD';

  const serveFile: RequestHandler = (request, response, next) => {
    if (isApi(request) || !isRead(request) || request.path.endsWith('.map')) next();
    else files(request, response, next);
  };
  const servePage = (request: Request, response: Response, next: NextFunction): void => {
    if (isApi(request) || !isRead(request)) {
      next();
      return;
    }
    if (isPagePath(request.path) && existsSync(page)) {
      response.setHeader('Cache-Control', 'no-cache');
      response.sendFile(page, { cacheControl: false, dotfiles: 'allow' });
      return;
    }
    writeProblem(response, (request as AppRequest).id, new AppError('NOT_FOUND'));
  };
  return [serveFile, servePage];
}
