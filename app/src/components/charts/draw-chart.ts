import type { DrawContext } from './draw-context';
import { drawFrame } from './draw-frame';
import { drawInset } from './draw-inset';
import { drawGraticule, drawGround, drawZeroLine } from './draw-graticule';
import { drawHarmonicDiscs, drawHarmonicRuler } from './draw-harmonics';
import { drawInsideLabels, drawRightLabels } from './draw-labels';
import { drawCornerWords, drawDimensions, drawNotes } from './draw-notes';
import { drawTraces } from './draw-traces';
import { drawWalls } from './draw-walls';
import { makeOccupancy } from './occupancy';

/** The whole chart with one pen: ground, graticule, walls, floor and traces, words, frame, ticks, names. */
export function drawChart(context: DrawContext): void {
  const { pen, drawn, geometry } = context;
  pen.save();
  drawGround(context);
  drawWalls(context);
  drawGraticule(context);
  drawZeroLine(context);
  drawTraces(context);
  drawHarmonicDiscs(context);
  const occupancy = makeOccupancy(drawn, geometry);
  drawDimensions(context);
  drawCornerWords(context);
  drawNotes(context, occupancy);
  drawInset(context, occupancy);
  drawFrame(context);
  drawHarmonicRuler(context);
  if (geometry.isInside) drawInsideLabels(context, occupancy);
  else drawRightLabels(context);
  pen.restore();
}
