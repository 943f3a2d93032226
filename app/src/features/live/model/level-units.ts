import type { ChannelResult } from '@benchlark/dsp';

/** In what levels are read. */
export const LEVEL_UNITS = ['dBFS', 'V', 'dBV', 'dBu', 'W'] as const;
export type LevelUnit = (typeof LEVEL_UNITS)[number];

/** 0 dBu is the voltage of 1 mW into 600 ohms: the square root of 0.6 V (IEC 60268-17). */
const DBU_OVER_DBV = 20 * Math.log10(1 / Math.sqrt(0.6));

export interface ReadLevel {
  /** Decides rounding. */
  readonly figureKey: string;
  readonly value: number | null | undefined;
  readonly unit: LevelUnit;
}

/**
 * A level figure in another unit: volts are the record's own, where there is a calibration.
 *
 * @param key - ends in Dbfs; any other stays as it is (null is returned)
 * @param loadOhm - for watts: U squared over R
 */
export function readLevel(
  key: string,
  figures: ChannelResult['figures'],
  unit: LevelUnit,
  loadOhm: number | null,
): ReadLevel | null {
  if (!key.endsWith('Dbfs')) return null;
  const stem = key.slice(0, -'Dbfs'.length);
  const numberAt = (name: string): number | null => {
    const value = figures[name];
    return typeof value === 'number' ? value : null;
  };
  const volts = numberAt(`${stem}V`);
  const dbv = numberAt(`${stem}Dbv`);
  switch (unit) {
    case 'dBFS':
      return { figureKey: key, value: numberAt(key), unit };
    case 'V':
      return { figureKey: `${stem}V`, value: volts, unit };
    case 'dBV':
      return { figureKey: `${stem}Dbv`, value: dbv, unit };
    case 'dBu':
      return { figureKey: `${stem}Dbv`, value: dbv === null ? null : dbv + DBU_OVER_DBV, unit };
    case 'W':
      return {
        figureKey: `${stem}V`,
        value: volts === null || loadOhm === null ? null : volts ** 2 / loadOhm,
        unit,
      };
  }
}
