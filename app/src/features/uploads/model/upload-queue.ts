import { isAbort } from '@/lib/api-client';
import { ApiError, noAnswer } from '@/lib/api-error';
import type { Capture } from '@/lib/api-schema';
import type { CaptureEvent } from '@/lib/event-stream';
import type { UploadHooks, UploadRequest } from '@/lib/upload-file';
import { isOnItsWay, isSettled } from './upload-entry';
import type { BatchFiling, UploadEntry } from './upload-entry';

export interface UploadQueueParts {
  readonly send: (request: UploadRequest, hooks: UploadHooks) => Promise<Capture>;
  readonly now: () => number;
  readonly newId: () => string;
  readonly onStored: (capture: Capture) => void;
}

/** Two at once keep a slow line and the server's disk busy; more would only make each of them slower. */
const AT_ONCE = 2;

/**
 * Sends recordings one after the other, outside of any page, so that moving about does not stop them. The state is
 * one list that is replaced on every change.
 */
export class UploadQueue {
  #entries: readonly UploadEntry[] = [];
  readonly #listeners = new Set<() => void>();
  readonly #aborts = new Map<string, AbortController>();
  readonly #parts: UploadQueueParts;
  #heldUntilMs = 0;

  constructor(parts: UploadQueueParts) {
    this.#parts = parts;
  }

  readonly subscribe = (listener: () => void): (() => void) => {
    this.#listeners.add(listener);
    return () => {
      this.#listeners.delete(listener);
    };
  };

  readonly entries = (): readonly UploadEntry[] => this.#entries;

  add(files: readonly File[], filing: BatchFiling, maxUploadBytes: number): void {
    const added = files.map((file): UploadEntry => {
      const error = refuseBeforeSending(file, maxUploadBytes);
      return {
        id: this.#parts.newId(),
        file,
        filing,
        phase: error ? 'refused' : 'waiting',
        sentBytes: 0,
        startedAtMs: null,
        capture: null,
        analysis: null,
        error,
      };
    });
    this.#replace([...this.#entries, ...added]);
    this.#startNext();
  }

  cancel(id: string): void {
    const entry = this.#find(id);
    if (!entry || !isOnItsWay(entry)) return;
    this.#update(id, { phase: 'cancelled', sentBytes: 0 });
    this.#aborts.get(id)?.abort();
    this.#startNext();
  }

  retry(id: string): void {
    const entry = this.#find(id);
    if (!entry || (entry.phase !== 'refused' && entry.phase !== 'cancelled')) return;
    this.#update(id, { phase: 'waiting', sentBytes: 0, startedAtMs: null, error: null });
    this.#startNext();
  }

  putAway(id: string): void {
    this.#replace(this.#entries.filter((entry) => entry.id !== id || isOnItsWay(entry)));
  }

  putAwaySettled(): void {
    this.#replace(this.#entries.filter((entry) => !isSettled(entry)));
  }

  /** Takes in what the server says about a capture that came from here. */
  applyEvent(event: CaptureEvent): void {
    for (const entry of this.#entries) {
      if (entry.capture?.id !== event.captureId) continue;
      this.#update(entry.id, { analysis: { state: event.state, progress: event.progress } });
    }
  }

  /** The captures whose analysis is still open, for asking while the stream of events is down. */
  openCaptureIds(): string[] {
    return this.#entries.flatMap((entry) => (entry.capture && !isSettled(entry) ? [entry.capture.id] : []));
  }

  #startNext(): void {
    const sending = this.#entries.filter((entry) => entry.phase === 'sending').length;
    if (sending >= AT_ONCE) return;
    const waitMs = this.#heldUntilMs - this.#parts.now();
    if (waitMs > 0) return;
    const next = this.#entries.find((entry) => entry.phase === 'waiting');
    if (!next) return;
    void this.#send(next);
    this.#startNext();
  }

  async #send(entry: UploadEntry): Promise<void> {
    const abort = new AbortController();
    this.#aborts.set(entry.id, abort);
    this.#update(entry.id, { phase: 'sending', startedAtMs: this.#parts.now() });
    try {
      const capture = await this.#parts.send(
        { file: entry.file, filing: entry.filing, idempotencyKey: entry.id },
        { signal: abort.signal, onProgress: (sentBytes) => this.#progress(entry.id, sentBytes) },
      );
      this.#update(entry.id, {
        phase: 'stored',
        sentBytes: entry.file.size,
        capture,
        analysis: { state: capture.state, progress: capture.progress },
      });
      this.#parts.onStored(capture);
    } catch (reason) {
      this.#fail(entry.id, reason);
    } finally {
      this.#aborts.delete(entry.id);
      this.#startNext();
    }
  }

  #progress(id: string, sentBytes: number): void {
    if (this.#find(id)?.phase === 'sending') this.#update(id, { sentBytes });
  }

  #fail(id: string, reason: unknown): void {
    if (isAbort(reason)) return; // cancel() has said so already
    const error = reason instanceof ApiError ? reason : noAnswer();
    const retryAfterS = error.facts.retryAfterS;
    if (error.code === 'TOO_MANY_REQUESTS' && retryAfterS !== undefined) {
      this.#hold(retryAfterS * 1000);
      this.#update(id, { phase: 'waiting', sentBytes: 0, startedAtMs: null });
      return;
    }
    this.#update(id, { phase: 'refused', sentBytes: 0, error });
  }

  /** The server asked for a pause: everything waits for it, and then goes on by itself. */
  #hold(forMs: number): void {
    this.#heldUntilMs = this.#parts.now() + forMs;
    setTimeout(() => this.#startNext(), forMs);
  }

  #find(id: string): UploadEntry | undefined {
    return this.#entries.find((entry) => entry.id === id);
  }

  #update(id: string, change: Partial<UploadEntry>): void {
    this.#replace(this.#entries.map((entry) => (entry.id === id ? { ...entry, ...change } : entry)));
  }

  #replace(entries: readonly UploadEntry[]): void {
    this.#entries = entries;
    for (const listener of this.#listeners) listener();
  }
}

function refuseBeforeSending(file: File, maxUploadBytes: number): ApiError | null {
  if (file.size === 0) {
    return new ApiError(0, 'FILE_EMPTY', {
      title: 'The file is empty',
      detail: 'The file holds no bytes at all.',
      remedy: 'Copy it from the recorder again.',
    });
  }
  if (file.size > maxUploadBytes) {
    return new ApiError(413, 'FILE_TOO_LARGE', {
      title: 'The file is larger than this bench takes',
      detail: 'The file is larger than this bench takes.',
      remedy: 'Cut the recording to the part that was played, or ask the administrator to raise the limit.',
    });
  }
  return null;
}
