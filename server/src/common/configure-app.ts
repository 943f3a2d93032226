import type { NestExpressApplication } from '@nestjs/platform-express';
import cookieParser from 'cookie-parser';
import type { NextFunction, Request, Response } from 'express';
import type { Env } from '../config/env.schema';
import { AppError } from './app-error';
import type { AppRequest } from './actor';
import { limitBodyTime } from './limit-body-time';
import { ProblemFilter, writeProblem } from './problem.filter';
import { AppValidationPipe } from './app-validation.pipe';
import { requestId } from './request-id.middleware';
import { securityHeaders } from './security-headers';
import { serveApp } from './serve-app';
import { ShutdownState } from './shutdown-state';

/** Above the longest thing a form can send; captures come as multipart and have their own limit. */
const JSON_BYTES_MAX = 2 * 1024 * 1024;
const BODY_TIME_MAX_MS = 30_000;

/** Answers 503 to what arrives while the process ends; the health routes go on telling. */
function refuseWhenEnding(state: ShutdownState) {
  return (request: Request, response: Response, next: NextFunction): void => {
    if (!state.isShuttingDown || request.path.startsWith('/api/health/')) {
      next();
      return;
    }
    response.setHeader('Connection', 'close');
    writeProblem(response, (request as AppRequest).id, new AppError('UNAVAILABLE', { retryAfterS: 5 }));
  };
}

/** Nothing the API says may be kept by a browser or a proxy, unless the route says otherwise. */
function keepPrivate(request: Request, response: Response, next: NextFunction): void {
  if (request.path.startsWith('/api')) response.setHeader('Cache-Control', 'no-store');
  next();
}

/** Sets up what every request passes: used by the server and, unchanged, by the tests. */
export function configureApp(app: NestExpressApplication, env: Env): void {
  app.disable('x-powered-by');
  app.set('trust proxy', env.TRUST_PROXY);
  app.set('etag', false);
  app.use(requestId);
  app.use(securityHeaders({ isHttps: env.PUBLIC_URL.startsWith('https:') }));
  app.use(refuseWhenEnding(app.get(ShutdownState)));
  app.use(keepPrivate);
  app.use(...serveApp(env.APP_DIST_DIR));
  app.use(limitBodyTime(BODY_TIME_MAX_MS));
  app.useBodyParser('json', { limit: JSON_BYTES_MAX, inflate: false });
  app.use(cookieParser());
  app.setGlobalPrefix('api');
  app.useGlobalPipes(new AppValidationPipe());
  app.useGlobalFilters(new ProblemFilter());
}
