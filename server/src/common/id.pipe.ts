import { ParseUUIDPipe } from '@nestjs/common';
import { AppError } from './app-error';

/** Reads a path parameter that is an id; what can't be one names nothing. */
export const IdPipe = new ParseUUIDPipe({ exceptionFactory: () => new AppError('NOT_FOUND') });
