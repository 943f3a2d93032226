import { createHash } from 'node:crypto';
import type { AnalysisSettings, MeasureId } from '@benchlark/dsp';

export interface AnalysisRequest {
  /** Null: recognised from the recording. */
  readonly measure: MeasureId | null;
  readonly settings: AnalysisSettings;
}

/** JSON with sorted keys, so that equal settings give equal text. */
function stableJson(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map(stableJson).join(',')}]`;
  if (typeof value !== 'object' || value === null) return JSON.stringify(value) ?? 'null';
  const entries = Object.entries(value).filter(([, inner]) => inner !== undefined);
  entries.sort(([a], [b]) => (a < b ? -1 : 1));
  return `{${entries.map(([key, inner]) => `${JSON.stringify(key)}:${stableJson(inner)}`).join(',')}}`;
}

/** Names an analysis of a capture: the same request with the same dsp is the same analysis. */
export function jobKey(request: AnalysisRequest, dspVersion: string): string {
  return createHash('sha256')
    .update(stableJson({ ...request, dspVersion }))
    .digest('hex');
}
