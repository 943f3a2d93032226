import { pipeline } from 'node:stream/promises';
import type { Request, Response } from 'express';
import { AppError } from '../common/app-error';
import type { ByteRange, ObjectStore } from '../storage/object-store';

/** RFC 6266 and RFC 8187: a plain name for old readers, the true one in UTF-8; nothing in either can end the header. */
export function attachmentHeader(fileName: string): string {
  const plain = fileName.replace(/[^\x20-\x7e]|["\\%]/g, '_');
  const encoded = encodeURIComponent(fileName).replace(
    /['()*]/g,
    (c) => `%${c.charCodeAt(0).toString(16).toUpperCase()}`,
  );
  return `attachment; filename="${plain}"; filename*=UTF-8''${encoded}`;
}

/** Headers under which stored bytes can never act as a page. */
export function setDownloadHeaders(response: Response, contentType: string, fileName?: string): void {
  response.setHeader('Content-Type', contentType);
  response.setHeader('X-Content-Type-Options', 'nosniff');
  response.setHeader('Content-Security-Policy', "sandbox; default-src 'none'");
  response.setHeader(
    'Content-Disposition',
    fileName === undefined ? 'attachment' : attachmentHeader(fileName),
  );
}

/**
 * Reads one range of a Range header (RFC 9110, section 14).
 *
 * @returns null for none, for another unit, or for several: the whole is sent then
 * @throws AppError RANGE_NOT_SATISFIABLE
 */
export function readRange(header: string | undefined, sizeBytes: number): ByteRange | null {
  const match = /^bytes=(\d*)-(\d*)$/.exec(header?.trim() ?? '');
  if (!match) return null;
  const [, first = '', last = ''] = match;
  if (first === '' && last === '') return null;
  const from = first === '' ? Math.max(0, sizeBytes - Number(last)) : Number(first);
  const to = first === '' || last === '' ? sizeBytes - 1 : Math.min(Number(last), sizeBytes - 1);
  if (from > to || (first === '' && Number(last) === 0)) throw new AppError('RANGE_NOT_SATISFIABLE');
  return { from, to };
}

/** Sends an object, or the part of it that the request asks for. Its headers are set already. */
export async function sendObject(
  request: Request,
  response: Response,
  object: { store: ObjectStore; sha256: string; sizeBytes: number },
): Promise<void> {
  const { store, sha256, sizeBytes } = object;
  response.setHeader('Accept-Ranges', 'bytes');
  response.setHeader('ETag', `"${sha256}"`);
  response.setHeader('Cache-Control', 'private, no-cache');
  if (request.headers['if-none-match'] === `"${sha256}"`) {
    response.status(304).end();
    return;
  }
  const ifRange = request.headers['if-range'];
  const isRangeWanted = ifRange === undefined || ifRange === `"${sha256}"`;
  const range = isRangeWanted ? readRange(request.headers.range, sizeBytes) : null;
  response.status(range ? 206 : 200);
  response.setHeader('Content-Length', String(range ? range.to - range.from + 1 : sizeBytes));
  if (range) response.setHeader('Content-Range', `bytes ${range.from}-${range.to}/${sizeBytes}`);
  if (request.method === 'HEAD') {
    response.end();
    return;
  }
  const bytes = await store.read(sha256, range ?? undefined);
  try {
    await pipeline(bytes, response);
  } catch (error) {
    // A listener that leaves in the middle is no failure of ours.
    if ((error as NodeJS.ErrnoException).code !== 'ERR_STREAM_PREMATURE_CLOSE') throw error;
  }
}
