import type {
  BenchRecord,
  ChannelResult,
  Component,
  MeasureId,
  RecordBody,
  Trace,
} from '../record/record.js';

/** A record as the rules look at it: its own measure, or a programme's parts. */
export interface RecordView {
  readonly record: BenchRecord;
  /** Bodies of a measure, in order. */
  bodies(measure: MeasureId): readonly RecordBody[];
  /** Every channel of every body of a measure. */
  channels(measure: MeasureId): readonly ViewedChannel[];
  /** Whether the recorder itself was overloaded in a channel, as any of some measures saw it. */
  isOverloaded(channel: string, measures: readonly MeasureId[]): boolean;
}

export interface ViewedChannel {
  readonly body: RecordBody;
  readonly channel: string;
  readonly result: ChannelResult;
}

export function viewRecord(record: BenchRecord): RecordView {
  const all: readonly RecordBody[] = [record, ...record.segments];
  const bodies = (measure: MeasureId): RecordBody[] => all.filter((body) => body.measure === measure);
  return {
    record,
    bodies,
    channels: (measure) =>
      bodies(measure).flatMap((body) =>
        body.channels.map((result) => ({ body, channel: result.channel, result })),
      ),
    isOverloaded: (channel, measures) =>
      measures
        .flatMap(bodies)
        .some(({ warnings }) =>
          warnings.some(
            ({ code, channel: of }) => code === 'recording-overloaded' && (of === null || of === channel),
          ),
        ),
  };
}

/** A figure that is a number; null otherwise. */
export function numberIn(figures: ChannelResult['figures'], key: string): number | null {
  const value = figures[key];
  return typeof value === 'number' ? value : null;
}

/** The strongest of some lines whose place and level are known; null without one. */
export function strongestLine(
  lines: readonly Component[],
  placeKey: string,
  levelKey: string,
): { readonly hz: number; readonly level: number } | null {
  let best: { hz: number; level: number } | null = null;
  for (const line of lines) {
    const [hz, level] = [line[placeKey], line[levelKey]];
    if (typeof hz === 'number' && typeof level === 'number' && level > (best?.level ?? -Infinity)) {
      best = { hz, level };
    }
  }
  return best;
}

export interface Point {
  readonly x: number;
  readonly y: number;
}

/** A trace's points, ascending in x; none for a trace that isn't there. */
export function pointsOf(result: Pick<ChannelResult, 'traces'>, name: string): Point[] {
  const trace = result.traces[name] as Trace | undefined;
  if (trace === undefined) return [];
  return Array.from(trace.x, (x, index) => ({ x, y: trace.y[index] })).sort((one, other) => one.x - other.x);
}

/** The point at a place, within a tolerance; null without one. */
export function pointAt(points: readonly Point[], x: number, tolerance = 0.01): Point | null {
  return points.find((point) => Math.abs(point.x - x) <= tolerance) ?? null;
}
