import { describe, expect, it } from 'vitest';
import type { ChartModel, TraceModel } from './chart-model';
import { wholeView } from './chart-model';
import { drawChart } from './draw-chart';
import type { Palette } from './palette';
import { buildScene } from './scene';
import { SvgPen } from './svg-pen';

const palette = new Proxy({ traces: ['#1', '#2', '#3', '#4', '#5', '#6'] } as unknown as Palette, {
  get: (target, key) => (key === 'traces' ? target.traces : String(key)),
});
const levels = Array.from({ length: 25 }, (_, index) => -120 + index * 5);
/** Falls with the level, as noise does, and jumps at the top, as a limit does. */
const trace: TraceModel = {
  id: 'left',
  name: 'left',
  kind: 'curve',
  slot: 1,
  x: levels,
  y: levels.map((level) => (level > -3 ? -30 : Math.max(-100, -120 - level))),
};
const model: ChartModel = {
  x: { quantity: 'Level', unit: 'dBFS', scale: 'linear', min: -122, max: 2 },
  y: { quantity: 'THD+N', unit: 'dB', scale: 'linear', min: -140, max: 0 },
  traces: [trace],
  inset: { title: 'the top 12 dB', view: { xMin: -12.5, xMax: 0.5, yMin: -120, yMax: -20 } },
};

function textsOf(width: number, change: Partial<ReturnType<typeof wholeView>> = {}): (string | null)[] {
  const scene = buildScene({
    model,
    view: { ...wholeView(model), ...change },
    hiddenIds: new Set(),
    width,
    height: 392,
    pixelRatio: 1,
    measure: (text, { sizePx }) => text.length * sizePx * 0.55,
  });
  const pen = new SvgPen();
  drawChart({ ...scene, pen, palette, pixelRatio: 1 });
  const drawing = new DOMParser().parseFromString(
    `<svg xmlns="http://www.w3.org/2000/svg">${pen.toMarkup()}</svg>`,
    'image/svg+xml',
  );
  return [...drawing.querySelectorAll('text')].map((text) => text.textContent);
}

describe('the inset', () => {
  it('stands in an empty corner with its title and its own ticks', () => {
    const texts = textsOf(790);
    expect(texts).toContain('the top 12 dB');
    expect(texts).toContain('\u221210');
  });

  it('is left out where there is no room for it, and while the chart is zoomed', () => {
    expect(textsOf(360)).not.toContain('the top 12 dB');
    expect(textsOf(790, { xMin: -40 })).not.toContain('the top 12 dB');
  });
});
