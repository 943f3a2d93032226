import { afterEach, describe, expect, it, vi } from 'vitest';
import { fetchTrace, splitTrace } from './fetch-trace';

function littleEndian(values: readonly number[]): Uint8Array<ArrayBuffer> {
  const view = new DataView(new ArrayBuffer(values.length * 8));
  values.forEach((value, n) => view.setFloat64(n * 8, value, true));
  return new Uint8Array(view.buffer);
}

const ref = { href: '/api/records/r/traces/t', points: 2, xUnit: 'Hz', yUnit: 'dBFS' };

describe('a fetched trace', () => {
  afterEach(() => {
    vi.unstubAllGlobals();
  });

  it('is all x, then all y', () => {
    expect(splitTrace(littleEndian([20, 1000, -120, -1.5]), 2)).toEqual({
      x: Float64Array.of(20, 1000),
      y: Float64Array.of(-120, -1.5),
    });
  });

  it('tells how many of its bytes have come', async () => {
    vi.stubGlobal('fetch', () => Promise.resolve(new Response(littleEndian([1, 2, 3, 4]))));
    const onProgress = vi.fn();
    const trace = await fetchTrace(ref, { signal: new AbortController().signal, onProgress });
    expect([...trace.y]).toEqual([3, 4]);
    expect(onProgress).toHaveBeenLastCalledWith({ loadedBytes: 32, totalBytes: 32 });
  });

  it('is refused when it breaks off or brings more than was said', async () => {
    const signal = new AbortController().signal;
    for (const values of [
      [1, 2, 3],
      [1, 2, 3, 4, 5],
    ]) {
      vi.stubGlobal('fetch', () => Promise.resolve(new Response(littleEndian(values))));
      await expect(fetchTrace(ref, { signal })).rejects.toMatchObject({ code: 'NO_ANSWER' });
    }
  });
});
