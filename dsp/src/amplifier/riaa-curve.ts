import { DspInputError } from '../errors.js';

/** Time constants of IEC 60098, seconds. */
const BASS_S = 3180e-6;
const MIDDLE_S = 318e-6;
const TREBLE_S = 75e-6;
/** Of the amendment's high pass, which takes rumble away. */
const AMENDMENT_S = 7950e-6;
const REFERENCE_HZ = 1000;

const firstOrder = (frequencyHz: number, timeS: number): number =>
  1 + (2 * Math.PI * frequencyHz * timeS) ** 2;

function replayPower(frequencyHz: number): number {
  return (
    firstOrder(frequencyHz, MIDDLE_S) / (firstOrder(frequencyHz, BASS_S) * firstOrder(frequencyHz, TREBLE_S))
  );
}

/**
 * The replay equalisation of records.
 *
 * @param frequencyHz - above 0
 * @param hasAmendment - with the high pass at 20 Hz that an amendment added
 * @returns dB against 1 kHz of the curve without the amendment
 * @throws DspInputError `BAD_ARGUMENT`
 * @see IEC 60098: (1 + s 318 µs) / ((1 + s 3180 µs)(1 + s 75 µs)), amendment s 7950 µs / (1 + s 7950 µs)
 */
export function riaaReplayDb(frequencyHz: number, hasAmendment = false): number {
  if (!(frequencyHz > 0) || !Number.isFinite(frequencyHz)) {
    throw new DspInputError('BAD_ARGUMENT', `the replay curve has no value at ${frequencyHz} Hz`);
  }
  const highPass = hasAmendment ? 1 - 1 / firstOrder(frequencyHz, AMENDMENT_S) : 1;
  return 10 * Math.log10((replayPower(frequencyHz) * highPass) / replayPower(REFERENCE_HZ));
}
