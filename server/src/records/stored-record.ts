import type { BenchRecord, Trace } from '@benchlark/dsp';

/** How a trace stands in a stored record: its bytes are in the object store. */
export interface TraceReference {
  readonly sha256: string;
  readonly points: number;
  readonly xUnit: string;
  readonly yUnit: string;
}

type Traces<T> = Readonly<Record<string, T>>;

interface StoredBody {
  readonly channels: readonly { readonly traces: Traces<TraceReference> }[];
  readonly between: { readonly traces: Traces<TraceReference> };
  readonly segments: readonly StoredBody[];
}

/** A record as it is kept: the contract's JSON with references for traces. */
export type StoredRecord = Omit<BenchRecord, keyof StoredBody> & StoredBody;

/** What stands where in a body's traces: segment 0 is the record itself. */
export interface TracePlace {
  readonly segment: number;
  readonly channel: string;
  readonly name: string;
}

interface BodyWithTraces<T> {
  readonly channels: readonly { readonly traces: Traces<T> }[];
  readonly between: { readonly traces: Traces<T> };
  readonly segments: readonly BodyWithTraces<T>[];
}

/**
 * Replaces every trace of a record, keeping everything else and the order of keys.
 *
 * @param body - a record, or the part of it that a segment has as well
 */
export function mapTraces<From, To>(
  body: BodyWithTraces<From>,
  replace: (trace: From, place: TracePlace) => To,
  segment = 0,
): BodyWithTraces<To> {
  const map = (traces: Traces<From>, channel: string): Traces<To> =>
    Object.fromEntries(
      Object.entries(traces).map(([name, trace]) => [name, replace(trace, { segment, channel, name })]),
    );
  return {
    ...body,
    channels: body.channels.map((channel) => ({
      ...channel,
      traces: map(channel.traces, (channel as { channel?: string }).channel ?? ''),
    })),
    between: { ...body.between, traces: map(body.between.traces, 'between') },
    segments: body.segments.map((inner, index) => mapTraces(inner, replace, index + 1)),
  };
}

/** The bytes of a trace: little-endian Float64, all x, then all y. */
export function encodeTrace({ x, y }: Pick<Trace, 'x' | 'y'>): Buffer {
  const bytes = Buffer.allocUnsafe((x.length + y.length) * 8);
  for (let n = 0; n < x.length; n++) bytes.writeDoubleLE(x[n] ?? NaN, n * 8);
  for (let n = 0; n < y.length; n++) bytes.writeDoubleLE(y[n] ?? NaN, (x.length + n) * 8);
  return bytes;
}

/** The reverse of encodeTrace. */
export function decodeTrace(bytes: Buffer): { x: Float64Array; y: Float64Array } {
  const points = bytes.length / 16;
  const x = new Float64Array(points);
  const y = new Float64Array(points);
  for (let n = 0; n < points; n++) {
    x[n] = bytes.readDoubleLE(n * 8);
    y[n] = bytes.readDoubleLE((points + n) * 8);
  }
  return { x, y };
}
