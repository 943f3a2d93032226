import { MulterError } from 'multer';
import { AppError } from '../../common/app-error';
import { toUploadError } from './upload-errors';

const LIMIT_BYTES = 1_000;
const broken = (code: string) => Object.assign(new Error(code), { code });

describe('toUploadError', () => {
  it.each([
    [broken('ENOSPC'), 'STORAGE_FULL'],
    [broken('EDQUOT'), 'STORAGE_FULL'],
    [new MulterError('LIMIT_FILE_SIZE', 'file'), 'FILE_TOO_LARGE'],
    [new MulterError('LIMIT_UNEXPECTED_FILE', 'other'), 'VALIDATION_FAILED'],
    [new Error('Unexpected end of form'), 'BAD_REQUEST'],
    [new Error('Multipart: Boundary not found'), 'BAD_REQUEST'],
  ])('tells the sender of %s', (error, code) => {
    expect((toUploadError(error, LIMIT_BYTES) as AppError).code).toBe(code);
  });

  it('lets through what was thrown on purpose, and what nobody expected', () => {
    const own = new AppError('UNAVAILABLE');
    expect(toUploadError(own, LIMIT_BYTES)).toBe(own);
    const unknown = broken('EIO');
    expect(toUploadError(unknown, LIMIT_BYTES)).toBe(unknown);
  });

  it('makes one thing of the ways in which a sender goes away', () => {
    for (const message of ['Request aborted', 'Request closed']) {
      expect((toUploadError(new Error(message), LIMIT_BYTES) as Error).message).toBe('Request aborted');
    }
  });
});
