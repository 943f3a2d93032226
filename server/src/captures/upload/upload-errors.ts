import { MulterError } from 'multer';
import { AppError } from '../../common/app-error';
import { fileTooLarge } from './upload-limits';

const DISK_FULL = new Set(['ENOSPC', 'EDQUOT', 'EFBIG']);

/** What multer, busboy or the disk throw while a form is received, as what the sender is told. */
export function toUploadError(error: unknown, maxBytes: number): unknown {
  if (error instanceof AppError) return error;
  const code = (error as NodeJS.ErrnoException).code ?? '';
  if (DISK_FULL.has(code)) {
    return new AppError('STORAGE_FULL', {
      detail: 'The disk filled up while the file arrived; nothing was kept.',
    });
  }
  if (error instanceof MulterError) {
    if (error.code === 'LIMIT_FILE_SIZE') return fileTooLarge(maxBytes);
    const field = error.field ?? 'file';
    return new AppError('VALIDATION_FAILED', { fields: { [field]: [error.message] } });
  }
  const message = error instanceof Error ? error.message : '';
  // busboy's own words for a body that is no form, or that ends in the middle of one
  if (/^(Multipart: Boundary not found|Malformed |Unexpected end of form)/.test(message)) {
    return new AppError('BAD_REQUEST', { detail: 'The form could not be read: it is cut off or malformed.' });
  }
  if (/^Request (aborted|closed)$/.test(message)) return new Error('Request aborted');
  return error;
}
