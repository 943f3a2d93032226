import type { Slot, TraceModel } from './chart-model';
import type { MarkerShape } from './draw-shapes';
import { type Palette, traceColour } from './palette';

const DASHES: Record<Slot, readonly number[]> = {
  1: [],
  2: [7, 4],
  3: [10, 3, 2, 3],
  4: [2, 3.5],
  5: [14, 4],
  6: [4, 2, 2, 2],
};
const MARKERS: Record<Slot, { shape: MarkerShape; isHollow: boolean }> = {
  1: { shape: 'disc', isHollow: false },
  2: { shape: 'square', isHollow: true },
  3: { shape: 'triangle', isHollow: true },
  4: { shape: 'diamond', isHollow: false },
  5: { shape: 'disc', isHollow: true },
  6: { shape: 'square', isHollow: false },
};
/** Up to so many points each gets a marker. */
const MOST_MARKED_POINTS = 60;

export interface TraceStyle {
  readonly colour: string;
  /** Text is a shade stronger where the line itself is pale. */
  readonly textColour: string;
  readonly width: number;
  readonly dash: readonly number[];
  readonly marker: { shape: MarkerShape; isHollow: boolean } | null;
}

/** Colour, width, dash and marker by slot and kind. Noisy spectra are never dashed. */
export function styleOf(trace: TraceModel, palette: Palette): TraceStyle {
  const { kind, slot } = trace;
  if (kind === 'floor') {
    return { colour: palette.floor, textColour: palette.ink2, width: 0.8, dash: [], marker: null };
  }
  if (kind === 'wave') {
    return { colour: palette.ink3, textColour: palette.ink3, width: 1, dash: [1, 3], marker: null };
  }
  const colour = traceColour(palette, slot);
  if (kind === 'spectrum')
    return { colour, textColour: colour, width: slot === 1 ? 1.3 : 1, dash: [], marker: null };
  const isMarked = trace.x.length <= MOST_MARKED_POINTS && !trace.isSecond;
  return {
    colour,
    textColour: colour,
    width: trace.isSecond ? 1.1 : slot === 1 ? 1.8 : 1.5,
    dash: DASHES[slot],
    marker: isMarked ? MARKERS[slot] : null,
  };
}
