import { makeWarning } from '../../record/make-warning.js';
import type { Figures, FigureLimit, LimitedBy, Warning } from '../../record/record.js';
import type { WarningCode } from '../../record/warning.js';
import type { FigureScale } from './figure-scale.js';

const RIG_LIMITED_DB = 3;
const INFLUENCED_NOISE_DB = 10;
const INFLUENCED_PRODUCT_DB = 20;
/** A quantiser's noise within this of a figure is what the figure shows. */
const QUANTISATION_DB = 3;

export interface LimitInputs {
  readonly channel: string;
  readonly figures: Figures;
  readonly scales: readonly FigureScale[];
  /** The same channel's figures in the rig's own record; null where it doesn't apply. */
  readonly baseline: Figures | null;
  /** Level of an ideal quantiser's noise on each figure's scale, dB; a key is missing where none applies. */
  readonly quantisationDb: Readonly<Record<string, number>>;
  readonly bits: number;
  readonly isOverloaded: boolean;
  readonly isTooShort: boolean;
}

export interface LimitResult {
  readonly limits: Record<string, FigureLimit>;
  readonly warnings: readonly Warning[];
}

/**
 * Says of each figure what keeps it from being the unit's own.
 *
 * One limit a figure, the gravest: overload, then a rig near enough to count, a segment too short, quantisation; a rig
 * far below is stated last, with its margin, so that the margin can be shown.
 *
 * @returns limits by figure, and one warning for each kind of limit met
 */
export function limitFigures(inputs: LimitInputs): LimitResult {
  const limits: Record<string, FigureLimit> = {};
  const met = new Map<WarningCode, string[]>();
  const note = (code: WarningCode, key: string): void => {
    met.set(code, [...(met.get(code) ?? []), key]);
  };
  for (const scale of inputs.scales) {
    const value = inputs.figures[scale.key];
    if (typeof value !== 'number') continue;
    const rig = rigLimit(scale, value, inputs.baseline?.[scale.key]);
    const quantisation = inputs.quantisationDb[scale.key];
    const marginToQuantisation = quantisation === undefined ? Infinity : scale.toDb(value) - quantisation;
    if (inputs.isOverloaded) limits[scale.key] = bareLimit('overload');
    else if (rig !== null && rig.code !== null) {
      limits[scale.key] = rig.limit;
      note(rig.code, scale.key);
    } else if (inputs.isTooShort) limits[scale.key] = bareLimit('length');
    else if (marginToQuantisation < QUANTISATION_DB) {
      limits[scale.key] = {
        by: 'quantisation',
        floor: scale.fromDb(quantisation),
        marginDb: marginToQuantisation,
        ...ordered(scale, null, scale.toDb(value)),
        below: null,
      };
      note('quantisation-limited', scale.key);
    } else if (rig !== null) limits[scale.key] = rig.limit;
  }
  const warnings = [...met].map(([code, figures]) =>
    makeWarning(code, { bits: inputs.bits }, { channel: inputs.channel, figures }),
  );
  return { limits, warnings };
}

/** A limit that has no floor: the figure stands, and says less than it seems to. */
export function bareLimit(by: LimitedBy, below: number | null = null): FigureLimit {
  return { by, floor: null, marginDb: null, low: null, high: null, below };
}

interface RigLimit {
  readonly limit: FigureLimit;
  readonly code: 'rig-limited' | 'rig-influenced' | null;
}

function rigLimit(
  scale: FigureScale,
  value: number,
  floor: number | string | null | undefined,
): RigLimit | null {
  if (typeof floor !== 'number') return null;
  const reading = scale.toDb(value);
  const floorDb = scale.toDb(floor);
  const margin = reading - floorDb;
  const bounds = scale.nature === 'noise' ? correctedNoise(reading, floorDb) : productBounds(reading, margin);
  const influenced = scale.nature === 'noise' ? INFLUENCED_NOISE_DB : INFLUENCED_PRODUCT_DB;
  return {
    limit: { by: 'rig', floor, marginDb: margin, ...ordered(scale, bounds.low, bounds.high), below: null },
    code: margin < RIG_LIMITED_DB ? 'rig-limited' : margin < influenced ? 'rig-influenced' : null,
  };
}

/** Noise of unit and rig adds as power: the unit's own is the difference; none is left to state at the floor. */
function correctedNoise(readingDb: number, floorDb: number): { low: number | null; high: number | null } {
  const own = 10 ** (readingDb / 10) - 10 ** (floorDb / 10);
  if (!(own > 0)) return { low: null, high: readingDb };
  const corrected = 10 * Math.log10(own);
  return { low: corrected, high: corrected };
}

/** A product of the rig adds to the unit's in a phase nobody knows. */
function productBounds(readingDb: number, marginDb: number): { low: number | null; high: number | null } {
  const ratio = 10 ** (-marginDb / 20);
  return {
    low: ratio < 1 ? readingDb + 20 * Math.log10(1 - ratio) : null,
    high: readingDb + 20 * Math.log10(1 + ratio),
  };
}

/** Bounds in dB on the figure's own scale, least first; an open end stays open. */
function ordered(
  scale: FigureScale,
  lowDb: number | null,
  highDb: number | null,
): { low: number | null; high: number | null } {
  const low = lowDb === null ? null : scale.fromDb(lowDb);
  const high = highDb === null ? null : scale.fromDb(highDb);
  const rises = scale.fromDb(1) > scale.fromDb(0);
  return rises ? { low, high } : { low: high, high: low };
}
