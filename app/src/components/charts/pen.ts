/** The part of a canvas context that the drawing uses; the same calls make the SVG of an export. */
export type Pen = Pick<
  CanvasRenderingContext2D,
  | 'save'
  | 'restore'
  | 'beginPath'
  | 'moveTo'
  | 'lineTo'
  | 'closePath'
  | 'arc'
  | 'rect'
  | 'clip'
  | 'stroke'
  | 'fill'
  | 'fillText'
  | 'strokeText'
  | 'setLineDash'
  | 'fillStyle'
  | 'strokeStyle'
  | 'lineWidth'
  | 'lineJoin'
  | 'font'
  | 'textAlign'
  | 'textBaseline'
>;

export const TEXT_FACE = "'Atkinson Hyperlegible Next', 'Benchlark Signs', sans-serif";
export const MONO_FACE = "'JetBrains Mono', 'Benchlark Signs', monospace";

export interface TextStyle {
  readonly sizePx: number;
  readonly weight?: 400 | 600;
  readonly isMono?: boolean;
}

export function fontOf({ sizePx, weight = 400, isMono = false }: TextStyle): string {
  return `${weight} ${sizePx}px ${isMono ? MONO_FACE : TEXT_FACE}`;
}

/** Width of a text in CSS pixels. */
export type MeasureText = (text: string, style: TextStyle) => number;
