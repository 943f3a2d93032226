import { formatDateTime } from '@/lib/format/date';
import type { ChartModel, ViewRange } from './chart-model';
import type { ChartSource } from './chart-source';
import { drawChart } from './draw-chart';
import type { ChartScene } from './draw-context';
import { axisName } from './draw-frame';
import { drawText } from './draw-text';
import { type Palette, readLightPalette } from './palette';
import type { Pen } from './pen';
import { buildScene, measureWithCanvas } from './scene';
import { embeddedFontFaces } from './export-fonts';
import { SvgPen } from './svg-pen';

export interface ChartToExport {
  readonly title: string;
  readonly sub: string;
  readonly model: ChartModel;
  readonly view: ViewRange;
  readonly hiddenIds: ReadonlySet<string>;
  readonly heightPx: number;
  readonly source: ChartSource;
}

const EXPORT_WIDTH_PX = 1100;
const PAD_PX = 24;
const CAPTION_PX = 78;
/** Two pixels for each: sharp on paper and on a fine screen. */
const PNG_RATIO = 2;

interface Sheet {
  readonly scene: ChartScene;
  readonly palette: Palette;
  readonly width: number;
  readonly height: number;
}

/** The light palette always: an exported chart goes onto paper, wherever it was made. */
function layOutSheet(chart: ChartToExport, pixelRatio: number): Sheet {
  const { model, view, hiddenIds, heightPx } = chart;
  const scene = buildScene({
    model,
    view,
    hiddenIds,
    width: EXPORT_WIDTH_PX,
    height: heightPx,
    pixelRatio,
    measure: measureWithCanvas,
  });
  return {
    scene,
    palette: readLightPalette(),
    width: EXPORT_WIDTH_PX + 2 * PAD_PX,
    height: heightPx + CAPTION_PX + 2 * PAD_PX,
  };
}

/** Title, conditions, units, record and date: what a figure on paper needs to be found again. */
export function captionLines({
  title,
  sub,
  model,
  source,
}: Pick<ChartToExport, 'title' | 'sub' | 'model' | 'source'>): string[] {
  const record = source.recordId ? `record ${source.recordId}` : 'a reading, not stored';
  return [
    sub === '' ? title : `${title}: ${sub}`,
    source.conditions,
    `${axisName(model.y)} over ${axisName(model.x).toLowerCase().replace(/, hz$/, ', Hz')}; ${record}; ${formatDateTime(source.date)}`,
  ];
}

function drawCaption(pen: Pen, { scene, palette }: Sheet, chart: ChartToExport): void {
  captionLines(chart).forEach((line, index) => {
    drawText({ ...scene, pen, palette, pixelRatio: 1 }, line, {
      sizePx: index === 0 ? 15 : 12.5,
      weight: index === 0 ? 600 : 400,
      colour: index === 0 ? palette.ink : palette.ink2,
      x: 0,
      y: chart.heightPx + 22 + index * 21,
    });
  });
}

/** The chart as an SVG document with its fonts inside. */
export async function exportSvg(chart: ChartToExport): Promise<Blob> {
  const sheet = layOutSheet(chart, 1);
  const pen = new SvgPen();
  drawChart({ ...sheet.scene, pen, palette: sheet.palette, pixelRatio: 1 });
  drawCaption(pen, sheet, chart);
  const fonts = await embeddedFontFaces();
  const { width, height, palette } = sheet;
  const markup = [
    `<svg xmlns="http://www.w3.org/2000/svg" width="${width}" height="${height}" viewBox="0 0 ${width} ${height}">`,
    `<style>${fonts}</style>`,
    `<rect width="${width}" height="${height}" fill="${palette.paper}"/>`,
    `<g transform="translate(${PAD_PX} ${PAD_PX})">`,
    pen.toMarkup(),
    '</g></svg>',
  ];
  return new Blob([markup.join('\n')], { type: 'image/svg+xml' });
}

export async function exportPng(chart: ChartToExport): Promise<Blob> {
  const sheet = layOutSheet(chart, PNG_RATIO);
  const canvas = document.createElement('canvas');
  canvas.width = sheet.width * PNG_RATIO;
  canvas.height = sheet.height * PNG_RATIO;
  const pen = canvas.getContext('2d');
  if (!pen) throw new Error('This browser gives no canvas to draw on');
  pen.scale(PNG_RATIO, PNG_RATIO);
  pen.fillStyle = sheet.palette.paper;
  pen.fillRect(0, 0, sheet.width, sheet.height);
  pen.translate(PAD_PX, PAD_PX);
  drawChart({ ...sheet.scene, pen, palette: sheet.palette, pixelRatio: PNG_RATIO });
  drawCaption(pen, sheet, chart);
  return new Promise((resolve, reject) => {
    canvas.toBlob(
      (blob) => (blob ? resolve(blob) : reject(new Error('The picture could not be made'))),
      'image/png',
    );
  });
}
