/** A synchronised exponential sweep, all that is needed to compute it anywhere. */
export interface SweepSignal {
  readonly lowHz: number;
  readonly highHz: number;
  /** L: the frequency grows e-fold in this time; lowHz · L is whole, so that every harmonic's sweep is in step. */
  readonly rateS: number;
  /** Raised cosines inside the sweep. */
  readonly fadeInS: number;
  readonly fadeOutS: number;
}

/** Seconds from lowHz to highHz. */
export function sweepDurationS({ lowHz, highHz, rateS }: SweepSignal): number {
  return rateS * Math.log(highHz / lowHz);
}

/** Seconds from the sweep's beginning to the moment at which it passes a frequency. */
export function sweepTimeS({ lowHz, rateS }: SweepSignal, frequencyHz: number): number {
  return rateS * Math.log(frequencyHz / lowHz);
}

/**
 * Gives the sweep that comes nearest to a duration.
 *
 * @see A. Novak, P. Lotton and L. Simon, "Synchronized Swept-Sine: Theory, Application, and Implementation", JAES 63(10), 2015
 */
export function planSweep(
  lowHz: number,
  highHz: number,
  durationS: number,
  fades: Pick<SweepSignal, 'fadeInS' | 'fadeOutS'>,
): SweepSignal {
  const rateS = Math.max(1, Math.round((lowHz * durationS) / Math.log(highHz / lowHz))) / lowHz;
  return { lowHz, highHz, rateS, ...fades };
}

/**
 * Renders a run of a sweep of unit amplitude: sin(2π f₁ L e^(t/L)), faded in and out.
 *
 * @param fromS - time of the sample with index 0, from the sweep's beginning; may be negative
 * @param stepS - time between samples
 * @param samples - filled; zero before the sweep's beginning and after its end
 * @param firstIndex - index of the first sample: a run cut anywhere gives the same values
 */
export function renderSweep(
  sweep: SweepSignal,
  fromS: number,
  stepS: number,
  samples: Float64Array,
  firstIndex = 0,
): void {
  const { lowHz, rateS, fadeInS, fadeOutS } = sweep;
  const durationS = sweepDurationS(sweep);
  const turnsAtStart = lowHz * rateS;
  for (let n = 0; n < samples.length; n++) {
    const t = fromS + (firstIndex + n) * stepS;
    if (t < 0 || t > durationS) {
      samples[n] = 0;
      continue;
    }
    const turns = turnsAtStart * Math.exp(t / rateS);
    let gain = 1;
    if (t < fadeInS) gain = 0.5 - 0.5 * Math.cos((Math.PI * t) / fadeInS);
    if (durationS - t < fadeOutS) gain *= 0.5 - 0.5 * Math.cos((Math.PI * (durationS - t)) / fadeOutS);
    samples[n] = gain * Math.sin(2 * Math.PI * (turns - Math.floor(turns)));
  }
}
