import { RequestMethod } from '@nestjs/common';
import type { Params } from 'nestjs-pino';
import type { Env } from '../config/env.schema';
import type { AppRequest } from './actor';

/** The address without its query: a query can hold what somebody searched for. */
function pathOf(url: string | undefined): string {
  return (url ?? '').split('?')[0] ?? '';
}

/** One JSON line a request, with method, path, status, time and request id; never headers, bodies or queries. */
export function loggerOptions(env: Pick<Env, 'LOG_LEVEL'>): Params {
  return {
    forRoutes: [{ path: '{*path}', method: RequestMethod.ALL }],
    pinoHttp: {
      level: env.LOG_LEVEL,
      timestamp: () => `,"time":"${new Date().toISOString()}"`,
      genReqId: (request) => (request as unknown as AppRequest).id,
      quietReqLogger: true,
      autoLogging: { ignore: (request) => (request.url ?? '').startsWith('/api/health/') },
      customLogLevel: (_request, response, error) =>
        error && response.statusCode >= 500 ? 'error' : response.statusCode >= 500 ? 'warn' : 'info',
      serializers: {
        req: (request: { method: string; url?: string; id: string; remoteAddress?: string }) => ({
          method: request.method,
          path: pathOf(request.url),
          ip: request.remoteAddress,
        }),
        res: (response: { statusCode: number }) => ({ status: response.statusCode }),
      },
    },
  };
}
