import { randomUUID } from 'node:crypto';
import type { NextFunction, Request, Response } from 'express';
import type { AppRequest } from './actor';

/** Gives every request an id of our own; one that a client sends is ignored, so that none can be forged. */
export function requestId(request: Request, response: Response, next: NextFunction): void {
  (request as AppRequest).id = randomUUID();
  response.setHeader('X-Request-Id', (request as AppRequest).id);
  next();
}
