import { DspInputError } from '../errors.js';
import type { RecordBody, Trace } from '../record/record.js';
import { riaaReplayDb } from './riaa-curve.js';

export interface RiaaDeviationOptions {
  /** Against the curve with the amendment's high pass. */
  readonly hasAmendment?: boolean;
  /** What was fed: a flat sweep, or one already bent by the recording curve, so that a true stage comes out flat. */
  readonly fed?: 'flat' | 'recording-curve';
}

export interface RiaaDeviation {
  readonly channel: string;
  /** dB over Hz, 0 at 1 kHz. */
  readonly deviation: Trace;
  /** The greatest from 20 Hz to 20 kHz, or as far as was measured. */
  readonly greatestDb: number;
  readonly greatestAtHz: number;
}

const LOW_HZ = 20;
const HIGH_HZ = 20_000;
const REFERENCE_HZ = 1000;

/**
 * Compares a phono stage's response with the replay curve of records.
 *
 * @param record - of a sweep, with its `response` traces
 * @returns one entry a channel
 * @throws DspInputError `BAD_RECORD` for another measure, or a response without 1 kHz
 */
export function riaaDeviation(
  record: Pick<RecordBody, 'measure' | 'channels'>,
  { hasAmendment = false, fed = 'flat' }: RiaaDeviationOptions = {},
): RiaaDeviation[] {
  if (record.measure !== 'sweep') {
    throw new DspInputError('BAD_RECORD', `a sweep's record is needed, not one of ${record.measure}`);
  }
  return record.channels.map(({ channel, traces }) => {
    const response = traces['response'];
    if (!response) throw new DspInputError('BAD_RECORD', `the channel ${channel} has no response`);
    return { channel, ...deviationOf(response, channel, (hz) => targetDb(hz, hasAmendment, fed)) };
  });
}

/** Of a stage fed with the recording curve only the amendment is left to be seen. */
function targetDb(frequencyHz: number, hasAmendment: boolean, fed: 'flat' | 'recording-curve'): number {
  const replay = riaaReplayDb(frequencyHz, hasAmendment);
  return fed === 'flat' ? replay : replay - riaaReplayDb(frequencyHz);
}

function deviationOf(
  { x, y, xUnit }: Trace,
  channel: string,
  target: (frequencyHz: number) => number,
): Omit<RiaaDeviation, 'channel'> {
  const hertz: number[] = [];
  const levels: number[] = [];
  for (let n = 0; n < x.length; n++) {
    if (x[n] <= 0 || !Number.isFinite(y[n])) continue;
    hertz.push(x[n]);
    levels.push(y[n] - target(x[n]));
  }
  const referenceDb = interpolate(hertz, levels, REFERENCE_HZ);
  if (referenceDb === null) {
    throw new DspInputError('BAD_RECORD', `the response of the channel ${channel} does not reach 1 kHz`);
  }
  const deviation = levels.map((level) => level - referenceDb);
  let [greatestDb, greatestAtHz] = [0, REFERENCE_HZ];
  hertz.forEach((hz, n) => {
    if (hz < LOW_HZ || hz > HIGH_HZ || Math.abs(deviation[n]) <= Math.abs(greatestDb)) return;
    [greatestDb, greatestAtHz] = [deviation[n], hz];
  });
  return { deviation: { xUnit, yUnit: 'dB', x: hertz, y: deviation }, greatestDb, greatestAtHz };
}

/** Linear over the logarithm of x; null outside. */
function interpolate(x: readonly number[], y: readonly number[], at: number): number | null {
  const after = x.findIndex((value) => value >= at);
  if (after < 0 || (after === 0 && x[0] > at)) return null;
  if (x[after] === at || after === 0) return y[after];
  const share = Math.log(at / x[after - 1]) / Math.log(x[after] / x[after - 1]);
  return y[after - 1] + share * (y[after] - y[after - 1]);
}
