import { Catch, HttpException, Logger, type ArgumentsHost, type ExceptionFilter } from '@nestjs/common';
import type { Response } from 'express';
import { APP_ERRORS, AppError, type AppErrorCode } from './app-error';
import type { AppRequest } from './actor';
import { isDatabaseUnavailable } from '../database/database-errors';

const CODE_BY_STATUS: Readonly<Record<number, AppErrorCode>> = {
  400: 'BAD_REQUEST',
  401: 'SIGNED_OUT',
  403: 'NOT_ALLOWED',
  404: 'NOT_FOUND',
  405: 'NOT_FOUND',
  408: 'REQUEST_TIMEOUT',
  409: 'CONFLICT',
  410: 'TOKEN_SPENT',
  413: 'BODY_TOO_LARGE',
  415: 'UNSUPPORTED_MEDIA_TYPE',
  422: 'UNPROCESSABLE',
  429: 'TOO_MANY_REQUESTS',
  503: 'UNAVAILABLE',
};
const RETRY_WHEN_UNAVAILABLE_S = 5;

/** The client went away: nobody is left to answer. */
function isClientGone(error: unknown): boolean {
  if (!(error instanceof Error)) return false;
  const { code, type } = error as { code?: unknown; type?: unknown };
  return type === 'request.aborted' || code === 'ECONNABORTED' || error.message === 'Request aborted';
}

/** Status of the errors that Nest, the body parser and Express make themselves; undefined for all others. */
function foreignStatus(error: unknown): number | undefined {
  if (error instanceof HttpException) return error.getStatus();
  if (!(error instanceof Error)) return undefined;
  const { status, expose } = error as { status?: unknown; expose?: unknown };
  return typeof status === 'number' && status < 500 && expose === true ? status : undefined;
}

function toAppError(error: unknown): AppError | undefined {
  if (error instanceof AppError) return error;
  if (isDatabaseUnavailable(error)) {
    return new AppError('UNAVAILABLE', { retryAfterS: RETRY_WHEN_UNAVAILABLE_S });
  }
  const status = foreignStatus(error);
  const code = status === undefined ? undefined : CODE_BY_STATUS[status];
  return code && new AppError(code);
}

/** Writes every error as RFC 9457 problem+json; unknown ones are logged once and answered without detail. */
@Catch()
export class ProblemFilter implements ExceptionFilter {
  readonly #logger = new Logger('Problem');

  catch(error: unknown, host: ArgumentsHost): void {
    const http = host.switchToHttp();
    const request = http.getRequest<AppRequest>();
    const response = http.getResponse<Response>();
    if (isClientGone(error)) {
      this.#logger.log({
        requestId: request.id,
        message: 'the client went away before the request was complete',
      });
      response.destroy();
      return;
    }
    const known = toAppError(error);
    if (!known || known.code === 'UNAVAILABLE') this.#logger.error({ requestId: request.id, err: error });
    if (response.headersSent) {
      response.destroy();
      return;
    }
    writeProblem(response, request.id, known ?? new AppError('INTERNAL'));
  }
}

/** Sends one problem; also used where no Nest handler is involved. */
export function writeProblem(response: Response, requestId: string, error: AppError): void {
  const { title, status } = APP_ERRORS[error.code];
  const { retryAfterS, ...details } = error.details;
  if (retryAfterS !== undefined)
    response.setHeader('Retry-After', String(Math.max(1, Math.ceil(retryAfterS))));
  response
    .status(status)
    .setHeader('Cache-Control', 'no-store')
    .type('application/problem+json')
    .send(JSON.stringify({ type: 'about:blank', title, status, code: error.code, ...details, requestId }));
}
