import type { IncomingMessage } from 'node:http';
import { AppError } from '../../common/app-error';

/** What the form around the file may take: boundaries, part headers, text fields. */
export const FORM_BYTES_MAX = 128 * 1024;

/** Limits of the multipart form; the file's own stands beside them. */
export const FORM_LIMITS = {
  files: 1,
  fields: 8,
  parts: 10,
  fieldNameSize: 64,
  fieldSize: 64 * 1024,
  headerPairs: 32,
  fieldNestingDepth: 0,
  fieldArrayIndexLimit: 0,
} as const;

export function fileTooLarge(maxBytes: number): AppError {
  return new AppError('FILE_TOO_LARGE', {
    detail: `The file is larger than ${maxBytes} bytes, the most that this bench accepts.`,
    remedy: 'Cut the recording into shorter files, or ask the administrator to raise the limit.',
  });
}

/** @throws AppError FILE_TOO_LARGE before a byte of the body is read, when its stated length says so */
export function refuseTooLarge(request: IncomingMessage, maxBytes: number): void {
  if (Number(request.headers['content-length'] ?? 0) > maxBytes + FORM_BYTES_MAX)
    throw fileTooLarge(maxBytes);
}
