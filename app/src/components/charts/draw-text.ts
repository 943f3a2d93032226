import type { DrawContext } from './draw-context';
import { fontOf, type TextStyle } from './pen';

export interface TextPlace extends TextStyle {
  readonly x: number;
  readonly y: number;
  readonly colour: string;
  readonly align?: 'left' | 'center' | 'right';
  /** Any text inside a plot has a stroke of the plot's ground under it. */
  readonly hasHalo?: boolean;
}

const HALO_PX = 4;

export function drawText({ pen, palette }: DrawContext, text: string, place: TextPlace): void {
  pen.font = fontOf(place);
  pen.textAlign = place.align ?? 'left';
  pen.textBaseline = 'middle';
  if (place.hasHalo) {
    pen.lineJoin = 'round';
    pen.lineWidth = HALO_PX;
    pen.setLineDash([]);
    pen.strokeStyle = palette.plot;
    pen.strokeText(text, place.x, place.y);
  }
  pen.fillStyle = place.colour;
  pen.fillText(text, place.x, place.y);
}
