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

const MOST_SLOTS = 6;

/** The slot of the first, second … trace of a chart. */
export function slotOf(index: number): Slot {
  return Math.min(MOST_SLOTS, Math.max(0, index) + 1) as Slot;
}

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
  /** A second reading of the same slot: thinner and without markers. */
  readonly isSecond?: boolean;
}

/** A place on x that the ruler over the frame counts: a harmonic by its order, or a product by its own label. */
export interface HarmonicMark {
  readonly order: number;
  /** In the order's place on the ruler: "f2 - f1". */
  readonly label?: string;
  /** What the cursor calls it: "2nd harmonic" unless given. */
  readonly name?: string;
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

/** A part of the chart drawn larger in an empty corner, with a range of its own on y. */
export interface Inset {
  readonly title: string;
  readonly view: ViewRange;
}

export interface ChartModel {
  readonly x: AxisModel;
  readonly y: AxisModel;
  readonly traces: readonly TraceModel[];
  readonly harmonics?: readonly HarmonicMark[];
  /** What the ruler over the frame counts: "harmonics" unless given. */
  readonly rulerWord?: string;
  readonly highlights?: readonly Highlight[];
  readonly notes?: readonly ChartNote[];
  readonly walls?: readonly Wall[];
  readonly hasZeroLine?: boolean;
  /** Names of a chart that stands over or under this one: both keep the same room for them. */
  readonly labelRoom?: readonly string[];
  /** One unit is as long on both axes: the frame is a square. */
  readonly isSquare?: boolean;
  /** Left out where the frame is too small for it, or while it is zoomed. */
  readonly inset?: Inset;
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
