import { openWav, type WavFile } from '@benchlark/dsp';
import { openFileBytes } from '../files/file-bytes';

/** Opens a WAV file for the length of `work`. */
export async function withWav<T>(path: string, work: (wav: WavFile) => Promise<T>): Promise<T> {
  const bytes = await openFileBytes(path);
  try {
    return await work(await openWav(bytes));
  } finally {
    await bytes.close();
  }
}
