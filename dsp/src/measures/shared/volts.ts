import type { Calibration, Figures, FigureUncertainty } from '../../record/record.js';
import { combineUncertainty } from './uncertainty.js';

const DB_PER_PERCENT = 20 / Math.LN10 / 100;

/** Levels against the peak of full scale, where the rest are against a full-scale sine's RMS. */
const PEAK_KEYS = new Set(['samplePeakDbfs', 'dcOffsetDbfs']);

export interface FiguresWithUncertainty {
  readonly figures: Figures;
  readonly uncertainty: Readonly<Record<string, FigureUncertainty>>;
}

/**
 * Adds a figure in volts and one in dBV beside every one in dBFS.
 *
 * A key loses its `Dbfs` and gains `V` and `Dbv`; `stimulus…` levels are of the file and have no volts. Peaks and the
 * offset are volts of peak, as their dBFS are against full-scale peak; the offset is signed in volts.
 *
 * @param channel - null where the calibration doesn't name the channel: nothing is added then
 * @param offset - mean of the samples, FS
 */
export function addVolts(
  input: FiguresWithUncertainty,
  channel: Calibration['channels'][number] | null,
  offset: number,
): FiguresWithUncertainty {
  if (channel === null) return input;
  const figures: Record<string, Figures[string]> = {};
  const uncertainty: Record<string, FigureUncertainty> = { ...input.uncertainty };
  for (const [key, value] of Object.entries(input.figures)) {
    figures[key] = value;
    if (!key.endsWith('Dbfs') || key.startsWith('stimulus')) continue;
    const stem = key.slice(0, -'Dbfs'.length);
    if (typeof value !== 'number') {
      figures[`${stem}V`] = null;
      figures[`${stem}Dbv`] = null;
      continue;
    }
    const fullScale = channel.fullScaleVrms * (PEAK_KEYS.has(key) ? Math.SQRT2 : 1);
    const volts = fullScale * 10 ** (value / 20);
    figures[`${stem}V`] = key === 'dcOffsetDbfs' && offset < 0 ? -volts : volts;
    figures[`${stem}Dbv`] = 20 * Math.log10(volts);
    const standardPercent = channel.expandedPercent / 2;
    const parts = [
      ...(input.uncertainty[key]?.components ?? []),
      { name: 'calibration', value: standardPercent * DB_PER_PERCENT },
    ];
    const inDb = combineUncertainty(parts);
    const inVolts = combineUncertainty(
      parts.map((part) => ({ ...part, value: ((part.value / DB_PER_PERCENT) * volts) / 100 })),
    );
    if (inDb !== null) uncertainty[`${stem}Dbv`] = inDb;
    if (inVolts !== null) uncertainty[`${stem}V`] = inVolts;
  }
  return { figures, uncertainty };
}

/** True when the calibration says that it holds at another rate than the recording's. */
export function isOtherRate(calibration: Calibration, sampleRateHz: number): boolean {
  return calibration.sampleRateHz !== undefined && calibration.sampleRateHz !== sampleRateHz;
}

/**
 * The calibration's entry for a channel, or null where it has none or holds at another rate.
 *
 * @param sampleRateHz - of the recording
 */
export function calibrationOf(
  calibration: Calibration | null | undefined,
  channel: string,
  sampleRateHz: number,
): Calibration['channels'][number] | null {
  if (calibration && isOtherRate(calibration, sampleRateHz)) return null;
  return calibration?.channels.find((entry) => entry.channel === channel) ?? null;
}
