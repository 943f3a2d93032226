import { Inject, Injectable, type CanActivate, type ExecutionContext } from '@nestjs/common';
import type { Request, Response } from 'express';
import { ENV } from '../../config/env.module';
import type { Env } from '../../config/env.schema';
import { lingerAfterAnswer } from './linger';
import { refuseTooLarge } from './upload-limits';

/** Refuses a body by its stated length, before the form is read. */
@Injectable()
export class UploadSizeGuard implements CanActivate {
  constructor(@Inject(ENV) private readonly env: Env) {}

  canActivate(context: ExecutionContext): boolean {
    const http = context.switchToHttp();
    const request = http.getRequest<Request>();
    lingerAfterAnswer(request, http.getResponse<Response>());
    refuseTooLarge(request, this.env.MAX_UPLOAD_BYTES);
    return true;
  }
}
