import { captureFactsOf, DspInputError, openWav, type CaptureFacts } from '@benchlark/dsp';
import { AppError, type AppErrorCode } from '../../common/app-error';
import { openFileBytes } from '../../files/file-bytes';
import type { FileWarning } from '../capture.entity';

/** Reader's codes that say the file is something else than a WAV file we read; all others say it is a broken one. */
const OTHER_KIND = new Set<string>([
  'WAV_EMPTY_FILE',
  'WAV_NOT_RIFF',
  'WAV_OTHER_CONTAINER',
  'WAV_COMPRESSED',
]);

/**
 * Reads header and chunks of a received file.
 *
 * @throws AppError NOT_A_WAV or WAV_UNREADABLE with the reader's code, byte offset, what was found and what to do
 */
export async function checkUpload(
  path: string,
  sha256: string,
): Promise<{ facts: CaptureFacts; fileWarnings: FileWarning[] }> {
  const bytes = await openFileBytes(path);
  try {
    const wav = await openWav(bytes);
    const fileWarnings = wav.warnings.map(({ code, message }) => ({ code, message }));
    return { facts: captureFactsOf(wav, sha256), fileWarnings };
  } catch (error) {
    if (!(error instanceof DspInputError)) throw error;
    const code: AppErrorCode = OTHER_KIND.has(error.code) ? 'NOT_A_WAV' : 'WAV_UNREADABLE';
    throw new AppError(code, { reason: error.code, detail: error.message, ...error.details });
  } finally {
    await bytes.close();
  }
}
