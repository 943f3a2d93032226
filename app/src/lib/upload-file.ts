import { refuse } from './api-client';
import { noAnswer } from './api-error';
import type { ApiError } from './api-error';
import type { Capture } from './api-schema';
import { currentCsrfToken } from './csrf';

export interface UploadRequest {
  readonly file: File;
  readonly filing: { readonly unitId?: string; readonly conditionId?: string; readonly rigId?: string };
  /** How a take of the Live page was made, as JSON. */
  readonly take?: string;
  /** The same key for the same file: an upload that is tried again after a lost answer is not stored twice. */
  readonly idempotencyKey: string;
}

export interface UploadHooks {
  readonly onProgress: (sentBytes: number) => void;
  readonly signal: AbortSignal;
}

/**
 * Sends one recording. `fetch` cannot tell how much of a body has been sent, so this one request is an XMLHttpRequest.
 *
 * @throws ApiError when the server refuses the file or does not answer; an `AbortError` when `signal` is aborted
 */
export async function uploadFile(request: UploadRequest, hooks: UploadHooks): Promise<Capture> {
  const token = await currentCsrfToken().catch(() => {
    throw noAnswer();
  });
  return new Promise((resolve, reject) => {
    const xhr = new XMLHttpRequest();
    const stop = () => xhr.abort();
    hooks.signal.addEventListener('abort', stop);
    const settle = (finish: () => void) => {
      hooks.signal.removeEventListener('abort', stop);
      finish();
    };
    xhr.upload.onprogress = (event) => hooks.onProgress(Math.min(event.loaded, request.file.size));
    xhr.onload = () => settle(() => answer(xhr, resolve, reject));
    xhr.onerror = () => settle(() => reject(noAnswer()));
    xhr.onabort = () => settle(() => reject(new DOMException('The upload was cancelled', 'AbortError')));
    xhr.open('POST', '/api/captures');
    xhr.setRequestHeader('x-csrf-token', token);
    xhr.setRequestHeader('idempotency-key', request.idempotencyKey);
    xhr.setRequestHeader('accept', 'application/json');
    if (hooks.signal.aborted) return reject(new DOMException('The upload was cancelled', 'AbortError'));
    xhr.send(toFormData(request));
  });
}

function answer(
  xhr: XMLHttpRequest,
  resolve: (capture: Capture) => void,
  reject: (error: ApiError) => void,
): void {
  if (xhr.status >= 200 && xhr.status < 300) {
    resolve(JSON.parse(xhr.responseText) as Capture); // the server's own 201 body, typed by its OpenAPI document
    return;
  }
  const headers = new Headers();
  const retryAfter = xhr.getResponseHeader('retry-after');
  if (retryAfter !== null) headers.set('retry-after', retryAfter);
  reject(refuse(xhr.status, xhr.responseText, headers));
}

/** The file comes last, so that the server knows where it belongs before its bytes arrive. */
function toFormData({ file, filing, take }: UploadRequest): FormData {
  const form = new FormData();
  for (const [name, value] of Object.entries(filing)) {
    if (value) form.set(name, value);
  }
  if (take !== undefined) form.set('take', take);
  form.set('file', file, file.name);
  return form;
}
