import { describe, expect, it } from 'vitest';
import type { ChartModel } from './chart-model';
import { drawChart } from './draw-chart';
import { csvCell, exportCsv } from './export-csv';
import type { Palette } from './palette';
import { readAt } from './readout';
import { buildScene } from './scene';
import { spectrumInWords, spectrumModel } from './spectrum-model';
import { SvgPen } from './svg-pen';

const x = Float64Array.from({ length: 400 }, (_, index) => 20 + index * 50);
const y = x.map((value) => (value === 1020 ? -1 : value === 2020 ? -60 : -120));
const channels = [
  { name: '=left', x, y },
  { name: 'right', x, y: y.map((level) => level - 1) },
];
const harmonics = [{ channel: '=left', order: 2, frequencyHz: 2020, levelDbr: -59 }];
const model: ChartModel = {
  ...spectrumModel({ channels, fundamentalHz: 1020, harmonics, rigAlone: { x, y: x.map(() => -140) } }),
  notes: [{ x: 2020, y: -60, lines: ['2nd <b>', 'a & b'] }],
  highlights: [{ fromX: 3000, toX: 5000, words: 'here' }],
  walls: [{ side: 'above', x: [20, 20000], y: [-10, -10], words: 'declared' }],
};
const colours = ['#1', '#2', '#3', '#4', '#5', '#6'];
const palette: Palette = {
  paper: 'paper',
  plot: 'plot',
  ink: 'ink',
  ink2: 'ink2',
  ink3: 'ink3',
  minor: 'minor',
  major: 'major',
  frame: 'frame',
  floor: 'floor',
  mask: 'mask',
  cursor: 'cursor',
  highlight: 'highlight',
  traces: colours,
};
const wholeScene = (width: number, hiddenIds = new Set<string>()) =>
  buildScene({
    model,
    view: { xMin: model.x.min, xMax: model.x.max, yMin: model.y.min, yMax: model.y.max },
    hiddenIds,
    width,
    height: 372,
    pixelRatio: 1,
    measure: (text, { sizePx }) => text.length * sizePx * 0.55,
  });

function drawSvg(width: number, hiddenIds?: Set<string>): Document {
  const pen = new SvgPen();
  drawChart({ ...wholeScene(width, hiddenIds), pen, palette, pixelRatio: 1 });
  return new DOMParser().parseFromString(
    `<svg xmlns="http://www.w3.org/2000/svg">${pen.toMarkup()}</svg>`,
    'image/svg+xml',
  );
}
const textsOf = (drawing: Document) => [...drawing.querySelectorAll('text')].map((text) => text.textContent);

describe('the chart as SVG', () => {
  it('is well formed whatever the words, and names axes, traces and the rig', () => {
    const drawing = drawSvg(900);
    expect(drawing.querySelector('parsererror')).toBeNull();
    const texts = textsOf(drawing);
    for (const words of [
      'Level, dBFS',
      'Frequency, Hz',
      '=left',
      'right',
      'rig alone',
      'harmonics',
      '2nd <b>',
      'here',
      'declared',
    ]) {
      expect(texts).toContain(words);
    }
  });

  it('draws no coordinate that is not a number', () => {
    const paths = [...drawSvg(900).querySelectorAll('path')].map((path) => path.getAttribute('d') ?? '');
    expect(paths.length).toBeGreaterThan(50);
    expect(paths.filter((path) => /NaN|Infinity/.test(path))).toEqual([]);
  });

  it('leaves a hidden trace out while the other keeps its colour', () => {
    const drawing = drawSvg(900, new Set(['=left']));
    expect(textsOf(drawing)).not.toContain('=left');
    const right = [...drawing.querySelectorAll('text')].find((text) => text.textContent === 'right');
    expect(right?.getAttribute('fill')).toBe('#2');
  });

  it('writes the names inside where there is no margin for them', () => {
    const { geometry } = wholeScene(340);
    const left = [...drawSvg(340).querySelectorAll('text')].find((text) => text.textContent === 'rig alone');
    expect(geometry.isInside).toBe(true);
    expect(Number(left?.getAttribute('x'))).toBeLessThan(geometry.left + geometry.width);
  });
});

describe('CSV', () => {
  it('makes no cell that a spreadsheet would run as a formula', () => {
    expect(['=1+1', '+a', '-a', '@a', 'a,b', 'say "so"', 'plain'].map(csvCell)).toEqual([
      "'=1+1",
      "'+a",
      "'-a",
      "'@a",
      '"a,b"',
      '"say ""so"""',
      'plain',
    ]);
  });

  it('writes every point of the shown traces over one x column', async () => {
    const source = {
      recordId: 'r-1',
      date: '2026-11-12T14:11:00Z',
      conditions: 'as received',
      fileStem: 's',
    };
    const chart = {
      title: 'Spectrum',
      sub: '',
      model,
      view: wholeScene(900).view,
      hiddenIds: new Set(['rig-alone']),
      heightPx: 372,
      source,
    };
    const lines = (await (await exportCsv(chart)).text()).trim().split('\r\n');
    expect(lines[3]).toBe(`"Frequency, Hz","'=left, level, dBFS","right, level, dBFS"`);
    expect(lines[4]).toBe('20,-120,-121');
    expect(lines).toHaveLength(4 + x.length);
    expect(lines[2]).toContain('record r-1');
  });
});

describe('the readout', () => {
  it('names the harmonic it stands on and reads every shown trace', () => {
    const readout = readAt(wholeScene(900), 2021);
    expect(readout?.title.replace(/\u202f|\u00a0/g, ' ')).toBe('2nd harmonic, 2 020 Hz');
    expect(readout?.rows.map(({ number }) => number)).toEqual(['\u221260.0', '\u221261.0', '\u2212140.0']);
  });

  it('puts the spectrum in words', () => {
    const words = spectrumInWords({ channels, harmonics, model });
    expect(words).toContain('highest line \u22121.0\u00a0dBFS at 1\u202f020 Hz');
    expect(words).toContain('2nd \u221259.0\u00a0dBr');
  });
});
