import type { Trace } from '../../record/record.js';
import type { ToneTrack } from '../shared/tone-tracker.js';

/** Points over one period of the fundamental. */
export const WAVE_POINTS = 1024;

/**
 * Draws what is left beside the fundamental, and the wave itself, over the fundamental's phase.
 *
 * The coefficients are the synchronous average of the recording over the fundamental's measured phase (see
 * `createToneTracker`): summing them is folding the time signal less its fundamental on that phase and averaging, for
 * any ratio of frequency and rate. A fold into bins would leave all but a few of 1,024 bins empty for a tone that shares
 * the rate's clock (1 kHz at 48 kHz meets 48 phases); the series runs through the very same 48 values and is band-limited
 * between them. The constant part is in the wave and not in the residual.
 *
 * @param mean - constant part, FS
 * @param amplitude - the fundamental's peak value, FS
 * @returns traces over 0 to 360°, the fundamental at sine phase 0, so the first half is the recording's positive half
 */
export function waveTraces(
  track: ToneTrack,
  amplitude: number,
  mean: number,
): { residual: Trace; wave: Trace } {
  const sines = Float64Array.from({ length: WAVE_POINTS }, (_, k) =>
    Math.sin((2 * Math.PI * k) / WAVE_POINTS),
  );
  const residual = new Float64Array(WAVE_POINTS);
  const quarter = WAVE_POINTS / 4;
  track.harmonics.forEach(({ re, im }, order) => {
    for (let point = 0; point < WAVE_POINTS; point++) {
      const angle = (order * point) % WAVE_POINTS;
      residual[point] += re * sines[angle] + im * sines[(angle + quarter) % WAVE_POINTS];
    }
  });
  const x = Float64Array.from({ length: WAVE_POINTS }, (_, point) => (360 * point) / WAVE_POINTS);
  const wave = residual.map((value, point) => value + amplitude * sines[point] + mean);
  return {
    residual: { xUnit: 'deg', yUnit: 'FS', x, y: residual },
    wave: { xUnit: 'deg', yUnit: 'FS', x, y: wave },
  };
}
