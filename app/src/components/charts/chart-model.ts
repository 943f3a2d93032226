/** One axis: what is on it, in which unit, over which range. */
export interface AxisModel {
  readonly quantity: string;
  readonly unit: string;
  readonly scale: 'linear' | 'log';
  /** The whole range; log axes need min > 0. */
  readonly min: number;
  readonly max: number;
  /** Print + before positive ticks. */
  readonly isSigned?: boolean;
  /** A fixed distance of ticks, where the quantity has one of its own (45 degrees). Doubled where there is no room. */
  readonly tickStep?: number;
}

/** `spectrum`: noisy, power-averaged under a pixel. `curve`: smooth. `floor`: the rig alone. `wave`: the dotted wave itself. */
export type TraceKind = 'spectrum' | 'curve' | 'floor' | 'wave';

/** The place of a trace in the order of colours, dashes and markers; it keeps it while hidden. */
export type Slot = 1 | 2 | 3 | 4 | 5 | 6;

export interface TraceModel {
  readonly id: string;
  readonly name: string;
  /** A second line under the name. */
  readonly sub?: string;
  readonly kind: TraceKind;
  readonly slot: Slot;
  /** Ascending; same length as y. */
  readonly x: ArrayLike<number>;
  /** NaN is a gap. */
  readonly y: ArrayLike<number>;
  /** In words beside the values of the readout, when it differs from the axis's. */
  readonly unit?: string;
}

export interface HarmonicMark {
  readonly order: number;
  readonly x: number;
  /** Where its open disc stands; null where it doesn't stand clear of the floor. */
  readonly y: number | null;
  readonly slot: Slot;
}

/** Words on a place: a dot, a leader, at most two lines. At most two notes in a chart. */
export interface ChartNote {
  readonly x: number;
  readonly y: number;
  readonly lines: readonly [string] | readonly [string, string];
}

export interface Highlight {
  readonly fromX: number;
  readonly toX: number;
  /** On a dimension line across it. */
  readonly words?: string;
}

/** A tolerance as a wall, hatched on its far side. */
export interface Wall {
  readonly side: 'above' | 'below';
  readonly x: readonly number[];
  readonly y: readonly number[];
  readonly words: string;
}

export interface ChartModel {
  readonly x: AxisModel;
  readonly y: AxisModel;
  readonly traces: readonly TraceModel[];
  readonly harmonics?: readonly HarmonicMark[];
  readonly highlights?: readonly Highlight[];
  readonly notes?: readonly ChartNote[];
  readonly walls?: readonly Wall[];
  readonly hasZeroLine?: boolean;
  /** A few words in the lower left corner: the scale of the wave. */
  readonly cornerWords?: string;
}

export interface ViewRange {
  readonly xMin: number;
  readonly xMax: number;
  readonly yMin: number;
  readonly yMax: number;
}

export function wholeView({ x, y }: Pick<ChartModel, 'x' | 'y'>): ViewRange {
  return { xMin: x.min, xMax: x.max, yMin: y.min, yMax: y.max };
}
