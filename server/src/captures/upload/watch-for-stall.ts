import type { Request } from 'express';
import { AppError } from '../../common/app-error';

/** Rejects `failure` once no byte of the request has come for the time; `end` stops watching. */
export function watchForStall(
  request: Request,
  stallMs: number,
): { failure: Promise<never>; end: () => void } {
  let seenBytes = request.socket.bytesRead;
  let seenAtMs = Date.now();
  let timer: NodeJS.Timeout | undefined;
  const failure = new Promise<never>((_, reject) => {
    timer = setInterval(
      () => {
        const { bytesRead } = request.socket;
        if (bytesRead !== seenBytes) {
          seenBytes = bytesRead;
          seenAtMs = Date.now();
        } else if (Date.now() - seenAtMs >= stallMs && !request.complete) {
          reject(
            new AppError('REQUEST_TIMEOUT', {
              detail: `Nothing of the file arrived for ${Math.round(stallMs / 1000)} s, so the upload was ended.`,
              remedy: 'Check the connection and upload the file again.',
            }),
          );
        }
      },
      Math.min(1_000, stallMs / 4),
    );
    timer.unref();
  });
  // Nobody may be waiting any more when it fails.
  failure.catch(() => undefined);
  return { failure, end: () => clearInterval(timer) };
}
