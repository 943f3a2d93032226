import {
  Inject,
  Injectable,
  type CallHandler,
  type ExecutionContext,
  type NestInterceptor,
} from '@nestjs/common';
import type { Request, Response } from 'express';
import multer, { type StorageEngine } from 'multer';
import { finalize, from, switchMap, type Observable } from 'rxjs';
import { ENV } from '../../config/env.module';
import type { Env } from '../../config/env.schema';
import { ObjectStore, StorageNotReadyError } from '../../storage/object-store';
import { receiveFile, removeFile, type ReceivedFile } from '../../storage/receive-file';
import { AppError } from '../../common/app-error';
import { toUploadError } from './upload-errors';
import { fileTooLarge, FORM_LIMITS } from './upload-limits';
import { watchForStall } from './watch-for-stall';

export interface ReceivedUpload extends ReceivedFile {
  /** As the sender calls it; only ever shown. */
  readonly fileName: string;
}

export interface UploadRequest extends Request {
  upload?: ReceivedUpload;
}

/**
 * Receives a capture's form: the file streams to the store's temp folder and is hashed on the way.
 *
 * Runs after the guards and before the pipes. Whatever happens afterwards (a wrong field, a bad file, a lost
 * connection), no temp file outlives the request; the store's `keep` takes a good one over.
 */
@Injectable()
export class CaptureUploadInterceptor implements NestInterceptor {
  constructor(
    private readonly store: ObjectStore,
    @Inject(ENV) private readonly env: Env,
  ) {}

  intercept(context: ExecutionContext, next: CallHandler): Observable<unknown> {
    const http = context.switchToHttp();
    const request = http.getRequest<UploadRequest>();
    let received: ReceivedUpload | undefined;
    const reception = this.receive(request, http.getResponse<Response>()).then((upload) => {
      received = upload;
      request.upload = upload;
    });
    return from(reception).pipe(
      switchMap(() => next.handle()),
      finalize(() => {
        // A kept file is no longer at its temp path; removing what is not there does nothing.
        if (received) void removeFile(received.path);
      }),
    );
  }

  private async receive(request: Request, response: Response): Promise<ReceivedUpload | undefined> {
    await this.ensureRoom(request);
    const ending = new AbortController();
    let reception: Promise<ReceivedUpload> | undefined;
    // multer waits for the end of a body it has refused; what made it refuse is known earlier.
    let refuse: (error: Error) => void = () => undefined;
    const refusal = new Promise<never>((_, reject) => (refuse = reject));
    refusal.catch(() => undefined); // it may come when nobody waits any more
    const engine: StorageEngine = {
      _handleFile: (_request, file, done) => {
        file.stream.once('limit', () => refuse(fileTooLarge(this.env.MAX_UPLOAD_BYTES)));
        reception = receiveFile(file.stream, this.store.tempFolder, ending.signal).then((stored) => ({
          ...stored,
          fileName: file.originalname,
        }));
        reception.then(
          (stored) => done(null, { path: stored.path, size: stored.sizeBytes }),
          (error: unknown) => {
            refuse(asError(error));
            done(error);
          },
        );
      },
      // Files are removed here, where their reception ends, and nowhere else.
      _removeFile: (_request, _file, done) => done(null),
    };
    const parse = multer({
      storage: engine,
      limits: { ...FORM_LIMITS, fileSize: this.env.MAX_UPLOAD_BYTES },
      defParamCharset: 'utf8',
    }).single('file');
    const stall = watchForStall(request, this.env.UPLOAD_STALL_MS);
    try {
      await Promise.race([
        new Promise<void>((resolve, reject) =>
          parse(request, response, (error: unknown) => (error ? reject(asError(error)) : resolve())),
        ),
        stall.failure,
        refusal,
      ]);
      return await reception;
    } catch (error) {
      ending.abort(asError(error));
      const leftover = await reception?.catch(() => undefined);
      if (leftover) await removeFile(leftover.path);
      throw toUploadError(error, this.env.MAX_UPLOAD_BYTES);
    } finally {
      stall.end();
    }
  }

  private async ensureRoom(request: Request): Promise<void> {
    try {
      await this.store.checkReady();
    } catch (error) {
      if (!(error instanceof StorageNotReadyError)) throw error;
      throw new AppError('UNAVAILABLE', {
        detail: 'The storage can’t be used at the moment.',
        retryAfterS: 30,
      });
    }
    const wantedBytes = Number(request.headers['content-length'] ?? 0);
    if ((await this.store.freeBytes()) - wantedBytes < this.env.STORAGE_MIN_FREE_BYTES) {
      throw new AppError('STORAGE_FULL', {
        detail: 'The storage has too little room left for this file.',
        remedy: 'Ask the administrator to make room, then try again.',
      });
    }
  }
}

function asError(error: unknown): Error {
  return error instanceof Error ? error : new Error(String(error));
}
