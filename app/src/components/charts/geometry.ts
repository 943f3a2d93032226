/** Where the frame stands within the drawing, CSS pixels. */
export interface Geometry {
  readonly left: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
  readonly totalWidth: number;
  readonly totalHeight: number;
  /** Too narrow for a margin of labels: names stand inside the frame. */
  readonly isInside: boolean;
}

const LEFT = 52;
const BOTTOM = 40;
const TOP = 26;
/** With the ruler over the axis's name. */
const TOP_TWO_ROWS = 46;
const INSIDE_BELOW = 372;
const LABEL_LEAD = 30;

export interface GeometryWants {
  readonly totalWidth: number;
  readonly totalHeight: number;
  /** Width of the widest trace name, or 0 where there are none. */
  readonly labelWidth: number;
  /** The axis's name and the harmonics' ruler would collide on one row. */
  readonly hasTwoRows: boolean;
  readonly isSquare?: boolean;
}

export function layOut({
  totalWidth,
  totalHeight,
  labelWidth,
  hasTwoRows,
  isSquare = false,
}: GeometryWants): Geometry {
  const isInside = totalWidth < INSIDE_BELOW;
  const right = labelWidth === 0 || isInside ? 14 : Math.min(156, Math.max(92, labelWidth + LABEL_LEAD));
  const top = hasTwoRows ? TOP_TWO_ROWS : TOP;
  const width = Math.max(40, totalWidth - LEFT - right);
  const height = Math.max(40, totalHeight - top - BOTTOM);
  const side = Math.min(width, height);
  return {
    left: LEFT,
    top,
    width: isSquare ? side : width,
    height: isSquare ? side : height,
    totalWidth,
    totalHeight,
    isInside,
  };
}
