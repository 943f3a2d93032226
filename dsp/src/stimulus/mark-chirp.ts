export const MARK_DURATION_S = 0.06;
export const MARK_LOW_HZ = 2000;
export const MARK_HIGH_HZ = 6000;
export const MARK_LEVEL_DBFS = -20;
const MARK_RAMP_S = 0.005;

/** Frequency's growth, Hz/s. */
const RATE_HZ_PER_S = (MARK_HIGH_HZ - MARK_LOW_HZ) / MARK_DURATION_S;

function markEnvelope(atS: number): number {
  const fromEdgeS = Math.min(atS, MARK_DURATION_S - atS);
  if (fromEdgeS <= 0) return 0;
  return fromEdgeS < MARK_RAMP_S ? 0.5 - 0.5 * Math.cos((Math.PI * fromEdgeS) / MARK_RAMP_S) : 1;
}

function markTurns(atS: number): number {
  const turns = atS * (MARK_LOW_HZ + 0.5 * RATE_HZ_PER_S * atS);
  return turns - Math.floor(turns);
}

/**
 * Gives a mark, a linear chirp of unit peak whose ends rise and fall as raised cosines.
 *
 * @param atS - seconds from its beginning
 * @returns its value; 0 outside it
 */
export function markAt(atS: number): number {
  const envelope = markEnvelope(atS);
  return envelope === 0 ? 0 : envelope * Math.sin(2 * Math.PI * markTurns(atS));
}

/** The mark a quarter turn on: with it a correlation's envelope no longer depends on the phase of the chain. */
export function quadratureMarkAt(atS: number): number {
  const envelope = markEnvelope(atS);
  return envelope === 0 ? 0 : envelope * Math.cos(2 * Math.PI * markTurns(atS));
}
