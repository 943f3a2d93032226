import { describe, expect, it } from 'vitest';
import type { ServedBody } from '../api/record-queries';
import { levelAxis, levelChoices, relevel } from './level-axis';
import { addedModel, deviationModel, transferModel } from './level-steps-model';
import type { ReadTrace } from './read-trace';

const LEVELS = [-60, -40, -20, -12, -6, -3, 0];

function makeTrace(name: string, y: number[], yUnit = 'dB'): ReadTrace {
  return {
    channel: 'left',
    name,
    trace: { x: Float64Array.from(LEVELS), y: Float64Array.from(y), xUnit: 'dBFS', yUnit },
  };
}

/** A unit that lies 4 dB below the recorder's full scale and gives way by 0.3 dB at the top. */
const traces = [
  makeTrace('deviation', [0.02, 0, 0, 0, 0, 0, -0.3]),
  makeTrace('measuredLevel', [-64, -44, -24, -16, -10, -7, -4.3], 'dBFS'),
  makeTrace('thdPlusNoise', [-40, -60, -80, -88, -90, -60, -26]),
  makeTrace('thd', [-70, -80, -95, -100, -100, -61, -26]),
];

function makeBody(unitFullScaleDbfs: number | null): ServedBody {
  const channel = {
    channel: 'left',
    figures: {},
    limits: {},
    uncertainty: {},
    harmonics: [],
    components: [],
    traces: {},
  };
  return {
    measure: 'level-steps',
    reference: { unitFullScaleDbfs, from: null },
    channels: [channel],
    between: { figures: {}, traces: {} },
  } as unknown as ServedBody;
}

describe('level axes', () => {
  it('offers the unit and the recorder only where the record says where they lie', () => {
    expect(levelChoices(makeBody(null))).toEqual(['stimulus']);
    expect(levelChoices(makeBody(-4))).toEqual(['stimulus', 'recorder', 'unit']);
  });

  it('puts a step where it was measured, and leaves out one that was not', () => {
    const measured = [makeTrace('measuredLevel', [NaN, -44, -24, -16, -10, -7, -4.3])];
    const inRecording = relevel(traces[0]!, 'recorder', measured, -4);
    expect([...inRecording.x]).toEqual([-44, -24, -16, -10, -7, -4.3]);
    const ofUnit = relevel(traces[0]!, 'unit', measured, -4);
    expect(ofUnit.x.at(-1)).toBeCloseTo(-0.3, 9);
    expect(ofUnit.y.at(-1)).toBe(-0.3);
  });

  it('shifts by the unit\u2019s full scale where no level was measured', () => {
    expect([...relevel(traces[0]!, 'recorder', [], -4).x].at(-1)).toBe(-4);
  });

  it('ends on tens with air for the markers', () => {
    const { min, max } = levelAxis('stimulus', [LEVELS]);
    expect(min).toBeLessThan(-60);
    expect(min).toBeGreaterThan(-62);
    expect(max).toBeGreaterThan(0);
  });
});

describe('charts of level steps', () => {
  const parts = { body: makeBody(-4), traces, against: 'stimulus' as const };

  it('draws the walls of still linear and says what the top step loses', () => {
    const model = deviationModel(parts);
    expect(model.walls?.map(({ side, y }) => [side, y[0]])).toEqual([
      ['above', 0.5],
      ['below', -0.5],
    ]);
    expect([model.y.min, model.y.max]).toEqual([-0.7, 0.7]);
    expect(model.notes?.[0]?.lines[0]).toBe('\u22120.30\u00a0dB at the top step, left');
  });

  it('puts both charts on one axis, with the same room for names', () => {
    const added = addedModel(parts, 'ratio');
    expect(added.x).toEqual(deviationModel(parts).x);
    expect(added.labelRoom).toEqual(deviationModel(parts).labelRoom);
  });

  it('draws THD thinner than THD+N in the same slot, and the top 12 dB apart', () => {
    const { traces: drawn, inset } = addedModel(parts, 'ratio');
    expect(drawn.map(({ name, slot, isSecond }) => [name, slot, isSecond])).toEqual([
      ['left, THD+N', 1, false],
      ['left, THD', 1, true],
    ]);
    expect(inset?.title).toBe('the top 12 dB');
    expect(inset?.view.yMin).toBe(-100);
    expect(inset?.view.yMax).toBe(-20);
  });

  it('is a square in which one decibel more in is one more out', () => {
    const { x, y, isSquare, traces: drawn } = transferModel(parts);
    expect(isSquare).toBe(true);
    expect(y.max - y.min).toBeCloseTo(x.max - x.min, 9);
    const line = drawn.find(({ id }) => id === 'one-for-one')!;
    expect(line.y[1]! - line.x[1]!).toBeCloseTo(-4, 9);
  });

  it('stands without traces while they come', () => {
    const empty = { ...parts, traces: [] };
    expect(deviationModel(empty).traces).toEqual([]);
    expect(addedModel(empty, 'level').inset).toBeUndefined();
    expect(Number.isFinite(transferModel(empty).y.min)).toBe(true);
  });
});
