import type { MeasureId } from '@benchlark/dsp';
import type { AnalyseRequest, Capture } from '@/lib/api-schema';
import type { ServedRecord } from '../api/record-queries';

/** The settings of an analysis that a person may change. */
export interface Method {
  readonly measure: MeasureId;
  readonly fromS: number;
  readonly toS: number;
  readonly bandLowHz: number;
  readonly bandHighHz: number;
  readonly highestHarmonic: number;
}

/** The contract's defaults: asking for them by name would make a second record of the same analysis. */
const DEFAULT_BAND_HZ = [20, 20_000] as const;
const DEFAULT_HIGHEST_HARMONIC = 10;
const HIGHEST_HARMONIC_ALLOWED = 100;

export function methodOf({ measure, settings }: Pick<ServedRecord, 'measure' | 'settings'>): Method {
  const { fromS, toS, bandLowHz, bandHighHz, highestHarmonic } = settings;
  return { measure, fromS, toS, bandLowHz, bandHighHz, highestHarmonic };
}

export function isSameMethod(a: Method, b: Method): boolean {
  return (Object.keys(a) as (keyof Method)[]).every((key) => a[key] === b[key]);
}

/** What is sent: the measure, and of the settings those that are not what the program would take by itself. */
export function toRequest(method: Method, capture: Pick<Capture, 'durationS'>): AnalyseRequest {
  const request: AnalyseRequest = { measure: method.measure };
  if (method.fromS !== 0) request.fromS = method.fromS;
  // The last frame's end, within half a millisecond: a person types fewer digits than the file has frames.
  if (Math.abs(method.toS - capture.durationS) > 0.0005) request.toS = method.toS;
  if (method.bandLowHz !== DEFAULT_BAND_HZ[0]) request.bandLowHz = method.bandLowHz;
  if (method.bandHighHz !== DEFAULT_BAND_HZ[1]) request.bandHighHz = method.bandHighHz;
  if (method.highestHarmonic !== DEFAULT_HIGHEST_HARMONIC) request.highestHarmonic = method.highestHarmonic;
  return request;
}

/** What is wrong with a method, as a sentence for each setting; empty when it can be measured. */
export function checkMethod(
  method: Method,
  capture: Pick<Capture, 'durationS' | 'sampleRateHz'>,
): Partial<Record<keyof Method, string>> {
  const wrong: Partial<Record<keyof Method, string>> = {};
  const nyquistHz = capture.sampleRateHz / 2;
  if (!(method.fromS >= 0)) wrong.fromS = 'It cannot begin before the recording does.';
  if (!(method.toS > method.fromS)) wrong.toS = 'It has to end after its beginning.';
  else if (method.toS > capture.durationS + 0.0005) wrong.toS = 'The recording is shorter than that.';
  if (!(method.bandLowHz > 0)) wrong.bandLowHz = 'The band begins above 0 Hz.';
  if (!(method.bandHighHz > method.bandLowHz)) wrong.bandHighHz = 'The band has to end above its beginning.';
  else if (method.bandHighHz > nyquistHz)
    wrong.bandHighHz = `At this sample rate the band ends at ${nyquistHz} Hz at most.`;
  const order = method.highestHarmonic;
  if (!Number.isInteger(order) || order < 2 || order > HIGHEST_HARMONIC_ALLOWED) {
    wrong.highestHarmonic = `A whole number from 2 to ${HIGHEST_HARMONIC_ALLOWED}.`;
  }
  return wrong;
}
