import type { DrawContext } from './draw-context';

export type MarkerShape = 'disc' | 'square' | 'triangle' | 'diamond';

export function strokeLine(
  { pen }: Pick<DrawContext, 'pen'>,
  points: readonly (readonly [number, number])[],
  stroke: { readonly colour: string; readonly width: number; readonly dash?: readonly number[] },
): void {
  pen.strokeStyle = stroke.colour;
  pen.lineWidth = stroke.width;
  pen.lineJoin = 'round';
  pen.setLineDash([...(stroke.dash ?? [])]);
  pen.beginPath();
  points.forEach(([x, y], index) => (index === 0 ? pen.moveTo(x, y) : pen.lineTo(x, y)));
  pen.stroke();
  pen.setLineDash([]);
}

/** A marker of about 3.2 px radius; areas are evened out between the shapes. */
export function drawMarker(
  { pen }: Pick<DrawContext, 'pen'>,
  shape: MarkerShape,
  at: { readonly x: number; readonly y: number; readonly radius: number },
  colours: { readonly stroke: string; readonly fill: string; readonly width?: number },
): void {
  const { x, y, radius } = at;
  pen.beginPath();
  if (shape === 'disc') pen.arc(x, y, radius, 0, 2 * Math.PI);
  else if (shape === 'square') pen.rect(x - radius * 0.9, y - radius * 0.9, radius * 1.8, radius * 1.8);
  else {
    const corners =
      shape === 'triangle'
        ? [
            [0, -1.2],
            [1.1, 0.8],
            [-1.1, 0.8],
          ]
        : [
            [0, -1.3],
            [1.15, 0],
            [0, 1.3],
            [-1.15, 0],
          ];
    corners.forEach(([dx = 0, dy = 0], index) =>
      index === 0
        ? pen.moveTo(x + dx * radius, y + dy * radius)
        : pen.lineTo(x + dx * radius, y + dy * radius),
    );
    pen.closePath();
  }
  pen.setLineDash([]);
  pen.fillStyle = colours.fill;
  pen.fill();
  pen.strokeStyle = colours.stroke;
  pen.lineWidth = colours.width ?? 1.3;
  pen.stroke();
}

/** Hatch at 45° inside a path: rising to the right is ours (the rig), falling is theirs (a tolerance). */
export function drawHatch(
  { pen, geometry }: Pick<DrawContext, 'pen' | 'geometry'>,
  tracePath: () => void,
  hatch: {
    readonly colour: string;
    readonly gap: number;
    readonly width: number;
    readonly isFalling: boolean;
  },
): void {
  const { left, top, width, height } = geometry;
  pen.save();
  pen.beginPath();
  pen.rect(left, top, width, height);
  pen.clip();
  pen.beginPath();
  tracePath();
  pen.clip();
  pen.strokeStyle = hatch.colour;
  pen.lineWidth = hatch.width;
  pen.setLineDash([]);
  pen.beginPath();
  for (let x = left - height; x < left + width + height; x += hatch.gap) {
    pen.moveTo(x, hatch.isFalling ? top : top + height);
    pen.lineTo(x + height, hatch.isFalling ? top + height : top);
  }
  pen.stroke();
  pen.restore();
}

export function clipToFrame({ pen, geometry }: Pick<DrawContext, 'pen' | 'geometry'>): void {
  pen.beginPath();
  pen.rect(geometry.left, geometry.top, geometry.width, geometry.height);
  pen.clip();
}
