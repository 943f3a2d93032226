import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { ApiError } from '@/lib/api-error';
import type { Capture } from '@/lib/api-schema';
import type { UploadHooks, UploadRequest } from '@/lib/upload-file';
import { isSettled, secondsLeft } from './upload-entry';
import { UploadQueue } from './upload-queue';

interface Sending {
  request: UploadRequest;
  hooks: UploadHooks;
  resolve: (capture: Capture) => void;
  reject: (error: unknown) => void;
}

const LIMIT = 1_000;

function makeQueue() {
  const sendings: Sending[] = [];
  const stored: Capture[] = [];
  let nextId = 0;
  const queue = new UploadQueue({
    now: () => Date.now(),
    newId: () => `upload-${(nextId += 1)}`,
    onStored: (capture) => stored.push(capture),
    send: (request, hooks) =>
      new Promise((resolve, reject) => {
        sendings.push({ request, hooks, resolve, reject });
        hooks.signal.addEventListener('abort', () => reject(new DOMException('stopped', 'AbortError')));
      }),
  });
  return { queue, sendings, stored };
}

function wav(name: string, size = 100): File {
  return new File([new Uint8Array(size)], name);
}

function capture(id: string): Capture {
  return { id, number: 7, state: 'queued', progress: null } as Capture;
}

const settle = () => vi.advanceTimersByTimeAsync(0);
const phases = (queue: UploadQueue) => queue.entries().map(({ phase }) => phase);

describe('the upload queue', () => {
  beforeEach(() => {
    vi.useFakeTimers();
  });
  afterEach(() => {
    vi.useRealTimers();
  });

  it('sends two at once and the next when one is stored', async () => {
    const { queue, sendings, stored } = makeQueue();
    queue.add([wav('a.wav'), wav('b.wav'), wav('c.wav')], { unitId: 'u1' }, LIMIT);
    expect(phases(queue)).toEqual(['sending', 'sending', 'waiting']);
    expect(sendings[0]!.request.filing).toEqual({ unitId: 'u1' });

    sendings[0]!.resolve(capture('c1'));
    await settle();
    expect(phases(queue)).toEqual(['stored', 'sending', 'sending']);
    expect(stored.map(({ id }) => id)).toEqual(['c1']);
  });

  it('follows the bytes and tells the time that is left', () => {
    const { queue, sendings } = makeQueue();
    queue.add([wav('a.wav', 800)], {}, LIMIT);
    vi.advanceTimersByTime(2_000);
    sendings[0]!.hooks.onProgress(200);
    const [entry] = queue.entries();
    expect(entry!.sentBytes).toBe(200);
    expect(secondsLeft(entry!, Date.now())).toBeCloseTo(6, 6); // 100 bytes a second, 600 to go
  });

  it('cancels one that is being sent and lets the next take its place', async () => {
    const { queue, sendings } = makeQueue();
    queue.add([wav('a.wav'), wav('b.wav'), wav('c.wav')], {}, LIMIT);
    queue.cancel('upload-1');
    await settle();
    expect(sendings[0]!.hooks.signal.aborted).toBe(true);
    expect(phases(queue)).toEqual(['cancelled', 'sending', 'sending']);
  });

  it('keeps why a file was refused, and tries again under the same key', async () => {
    const { queue, sendings } = makeQueue();
    queue.add([wav('a.wav')], {}, LIMIT);
    sendings[0]!.reject(new ApiError(415, 'NOT_A_WAV', { title: 'Not a wave file', offset: 0 }));
    await settle();
    expect(queue.entries()[0]!.error).toMatchObject({ code: 'NOT_A_WAV', facts: { offset: 0 } });

    queue.retry('upload-1');
    expect(sendings).toHaveLength(2);
    expect(sendings[1]!.request.idempotencyKey).toBe(sendings[0]!.request.idempotencyKey);
  });

  it('refuses an empty file and one over the limit without sending a byte', () => {
    const { queue, sendings } = makeQueue();
    queue.add([wav('empty.wav', 0), wav('long.wav', LIMIT + 1), wav('just.wav', LIMIT)], {}, LIMIT);
    expect(queue.entries().map(({ error }) => error?.code ?? null)).toEqual([
      'FILE_EMPTY',
      'FILE_TOO_LARGE',
      null,
    ]);
    expect(sendings).toHaveLength(1);
  });

  it('waits as long as the server asks and then goes on by itself', async () => {
    const { queue, sendings } = makeQueue();
    queue.add([wav('a.wav')], {}, LIMIT);
    sendings[0]!.reject(new ApiError(429, 'TOO_MANY_REQUESTS', { title: 'Slowly', retryAfterS: 3 }));
    await settle();
    expect(phases(queue)).toEqual(['waiting']);
    await vi.advanceTimersByTimeAsync(3_000);
    expect(phases(queue)).toEqual(['sending']);
  });

  it('follows the analysis and puts away only what is settled', async () => {
    const { queue, sendings } = makeQueue();
    queue.add([wav('a.wav'), wav('b.wav')], {}, LIMIT);
    sendings[0]!.resolve(capture('c1'));
    await settle();
    queue.applyEvent({ captureId: 'c1', state: 'analysing', progress: 0.5 });
    expect(queue.entries()[0]!.analysis).toEqual({ state: 'analysing', progress: 0.5 });
    expect(queue.openCaptureIds()).toEqual(['c1']);
    queue.putAwaySettled();
    queue.putAway('upload-2');
    expect(queue.entries()).toHaveLength(2);

    queue.applyEvent({ captureId: 'c1', state: 'done', progress: 1 });
    expect(isSettled(queue.entries()[0]!)).toBe(true);
    queue.putAwaySettled();
    expect(queue.entries().map(({ id }) => id)).toEqual(['upload-2']);
  });

  it('tells its listeners of every change until they leave', () => {
    const { queue } = makeQueue();
    const listener = vi.fn();
    const leave = queue.subscribe(listener);
    queue.add([wav('a.wav')], {}, LIMIT);
    const calls = listener.mock.calls.length;
    expect(calls).toBeGreaterThan(0);
    leave();
    queue.cancel('upload-1');
    expect(listener).toHaveBeenCalledTimes(calls);
  });
});
