import type { Trace } from '../../record/record.js';
import { levelSpectrumDbfs, type PowerSpectrum } from '../../spectrum/power-spectrum.js';

/** Where a spectrum has nothing at all, a trace still needs a number. */
const TRACE_FLOOR_DBFS = -400;

/** Makes the level spectrum's trace, 0 Hz to half the rate: a sine of peak a reads 20 lg a at its bin. */
export function spectrumTrace(spectrum: PowerSpectrum): Trace {
  const y = levelSpectrumDbfs(spectrum).map((level) => Math.max(TRACE_FLOOR_DBFS, level));
  const x = Float64Array.from({ length: y.length }, (_, k) => k * spectrum.binWidthHz);
  return { xUnit: 'Hz', yUnit: 'dBFS', x, y };
}
