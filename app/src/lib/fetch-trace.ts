import { isAbort, refuse } from './api-client';
import { noAnswer } from './api-error';

export interface TraceRef {
  readonly href: string;
  readonly points: number;
  readonly xUnit: string;
  readonly yUnit: string;
}

export interface FetchedTrace {
  readonly x: Float64Array;
  readonly y: Float64Array;
  readonly xUnit: string;
  readonly yUnit: string;
}

export interface TraceProgress {
  readonly loadedBytes: number;
  readonly totalBytes: number;
}

const BYTES_PER_NUMBER = 8;

/**
 * Fetches a trace in full resolution: little-endian Float64, all x then all y.
 *
 * @throws ApiError when it is refused or breaks off
 */
export async function fetchTrace(
  ref: TraceRef,
  options: { signal: AbortSignal; onProgress?: (progress: TraceProgress) => void },
): Promise<FetchedTrace> {
  const totalBytes = ref.points * 2 * BYTES_PER_NUMBER;
  const bytes = await readAll(ref.href, totalBytes, options);
  return { ...splitTrace(bytes, ref.points), xUnit: ref.xUnit, yUnit: ref.yUnit };
}

async function readAll(
  href: string,
  totalBytes: number,
  { signal, onProgress }: { signal: AbortSignal; onProgress?: (progress: TraceProgress) => void },
): Promise<Uint8Array> {
  const bytes = new Uint8Array(totalBytes);
  let loadedBytes = 0;
  try {
    const response = await fetch(href, { signal });
    if (!response.ok) throw refuse(response.status, await response.text(), response.headers);
    const reader = response.body?.getReader();
    for (let part = await reader?.read(); part && !part.done; part = await reader?.read()) {
      if (loadedBytes + part.value.length > totalBytes) throw noAnswer();
      bytes.set(part.value, loadedBytes);
      loadedBytes += part.value.length;
      onProgress?.({ loadedBytes, totalBytes });
    }
  } catch (reason) {
    throw isAbort(reason) || !(reason instanceof TypeError) ? reason : noAnswer();
  }
  if (loadedBytes !== totalBytes) throw noAnswer();
  return bytes;
}

/** Byte order is read through a DataView: a typed array would take the machine's own. */
export function splitTrace(bytes: Uint8Array, points: number): { x: Float64Array; y: Float64Array } {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const column = (first: number) =>
    Float64Array.from({ length: points }, (_, n) => view.getFloat64((first + n) * BYTES_PER_NUMBER, true));
  return { x: column(0), y: column(points) };
}
