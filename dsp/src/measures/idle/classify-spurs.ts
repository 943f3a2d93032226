import { meanSquareToDbfs } from '../../level/decibel.js';
import type { Component } from '../../record/record.js';
import type { PowerSpectrum } from '../../spectrum/power-spectrum.js';
import { removeLobes } from '../../spectrum/remove-lobes.js';
import { isMainsLine, type MainsHum } from '../shared/find-mains.js';
import type { Spur } from '../shared/find-spurs.js';

export type SpurKind = 'mains' | 'frame' | 'unknown';

/** USB sends a frame each millisecond (full speed) and a microframe each eighth of one: 1 kHz and 8 kHz, and multiples. */
const FRAME_HZ = 1000;
/** Host and recorder run on different crystals. */
const CLOCK_TOLERANCE = 200e-6;
/** Multiples of the grid's frequency above this are no longer told from chance. */
const HIGHEST_MAINS_HZ = 2500;

/**
 * Lists the lines of an idle recording, strongest first, each with what it probably is.
 *
 * @see Universal Serial Bus Specification 2.0, 8.4.3 (frames of 1 ms, microframes of 125 µs)
 */
export function classifySpurs(
  spectrum: PowerSpectrum,
  spurs: readonly Spur[],
  mains: MainsHum | null,
): Component[] {
  const { lobes } = removeLobes(
    spectrum,
    spurs.map(({ frequencyHz }) => frequencyHz),
  );
  return spurs
    .map(({ frequencyHz }, index) => ({ frequencyHz, power: lobes[index].power }))
    .filter(({ power }) => power > 0)
    .sort((one, other) => other.power - one.power)
    .map(({ frequencyHz, power }) => ({
      frequencyHz,
      levelDbfs: meanSquareToDbfs(power),
      kind: kindOf(spectrum, frequencyHz, mains),
    }));
}

function kindOf(spectrum: PowerSpectrum, frequencyHz: number, mains: MainsHum | null): SpurKind {
  const multiple = Math.round(frequencyHz / FRAME_HZ);
  const reach = spectrum.binWidthHz / 2 + CLOCK_TOLERANCE * frequencyHz;
  // Every 20th multiple of an exact 50 Hz is one of 1 kHz too; so far up it is hardly ever the grid's.
  if (multiple >= 1 && Math.abs(frequencyHz - multiple * FRAME_HZ) <= reach) return 'frame';
  if (
    mains !== null &&
    frequencyHz <= HIGHEST_MAINS_HZ &&
    isMainsLine(spectrum, frequencyHz, mains.frequencyHz)
  )
    return 'mains';
  return 'unknown';
}
