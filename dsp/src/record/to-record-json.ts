import type { Between, BenchRecord, ChannelResult, RecordBody, Trace } from './record.js';
import { reduceTrace } from './reduce-trace.js';
import { roundNumbers } from './round-numbers.js';

export type TraceDetail = 'none' | 'reduced' | 'full';

/**
 * Makes the JSON form of a record: plain objects and arrays, keys in the record's own order, numbers rounded to nine
 * significant digits.
 *
 * @param record - not modified
 * @param options - how much of the traces to keep: none, at most 2,000 points each with peaks kept, or all
 * @returns a record that `JSON.stringify` writes the same everywhere
 * @throws DspInputError `OUT_OF_RANGE` if a number isn't finite
 */
export function toRecordJson(record: BenchRecord, options: { readonly traces: TraceDetail }): BenchRecord {
  const { schema, dspVersion, capture } = record;
  const { measure, ...rest } = bodyWithTraces(record, options.traces);
  return roundNumbers({ schema, dspVersion, measure, capture, ...rest });
}

function bodyWithTraces(body: RecordBody, detail: TraceDetail): RecordBody {
  return {
    measure: body.measure,
    settings: body.settings,
    reference: body.reference,
    stimulus: body.stimulus,
    channels: body.channels.map((channel) => channelWithTraces(channel, detail)),
    between: betweenWithTraces(body.between, detail),
    findings: body.findings,
    warnings: body.warnings,
    segments: body.segments.map((segment) => bodyWithTraces(segment, detail)),
  };
}

function channelWithTraces(channel: ChannelResult, detail: TraceDetail): ChannelResult {
  return {
    channel: channel.channel,
    figures: channel.figures,
    limits: channel.limits,
    uncertainty: channel.uncertainty,
    harmonics: channel.harmonics,
    components: channel.components,
    traces: detailTraces(channel.traces, detail),
  };
}

function betweenWithTraces(between: Between, detail: TraceDetail): Between {
  return { figures: between.figures, traces: detailTraces(between.traces, detail) };
}

function detailTraces(traces: Readonly<Record<string, Trace>>, detail: TraceDetail): Record<string, Trace> {
  if (detail === 'none') return {};
  const entries = Object.entries(traces);
  return Object.fromEntries(
    detail === 'full' ? entries : entries.map(([name, trace]) => [name, reduceTrace(trace)]),
  );
}
