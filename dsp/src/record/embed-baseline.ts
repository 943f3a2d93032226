import type { BenchRecord, RecordBody } from './record.js';

/**
 * Makes the form in which settings embed the rig's own record: whole but for its traces and the baseline that it may
 * itself carry.
 *
 * @param record - of the rig without a unit; not modified
 * @param inputRange - the recorder's range it was taken in, in words; left out, the record's own is kept
 * @returns the same object from the same record, however often it is embedded
 */
export function embedBaseline(record: BenchRecord, inputRange?: string): BenchRecord {
  return {
    ...record,
    ...withoutTraces(record),
    settings: { ...record.settings, baseline: null, ...(inputRange === undefined ? {} : { inputRange }) },
  };
}

function withoutTraces(body: RecordBody): RecordBody {
  return {
    ...body,
    channels: body.channels.map((channel) => ({ ...channel, traces: {} })),
    between: { figures: body.between.figures, traces: {} },
    segments: body.segments.map(withoutTraces),
  };
}
