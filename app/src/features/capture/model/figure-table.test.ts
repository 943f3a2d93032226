import type { BenchRecord, FigureLimit } from '@benchlark/dsp';
import { describe, expect, it } from 'vitest';
import { buildFigureTable } from './figure-table';

const limit = (change: Partial<FigureLimit>): FigureLimit => ({
  by: 'rig',
  floor: null,
  marginDb: null,
  low: null,
  high: null,
  below: null,
  ...change,
});

function makeRecord(
  change: Partial<BenchRecord> = {},
): Pick<BenchRecord, 'settings' | 'warnings' | 'channels'> {
  const channel = (
    name: string,
    figures: Record<string, number | null>,
    limits: Record<string, FigureLimit> = {},
  ) => ({
    channel: name,
    figures,
    limits,
    uncertainty: {},
    harmonics: [],
    components: [],
    traces: {},
  });
  return {
    settings: {
      fromS: 0,
      toS: 5,
      window: 'blackman-harris-7',
      fftLength: 65536,
      bandLowHz: 20,
      bandHighHz: 20000,
      highestHarmonic: 10,
      calibration: null,
      baseline: null,
    },
    warnings: [],
    channels: [
      channel('left', {
        thdDb: -35.2,
        snrDb: null,
        fundamentalFrequencyHz: 997,
        fundamentalLevelDbfs: -1.09,
        oddityDb: 0.1,
      }),
      channel(
        'right',
        { thdDb: null, snrDb: 106.9 },
        { thdDb: limit({ below: -132 }), snrDb: limit({ marginDb: 8 }) },
      ),
    ],
    ...change,
  };
}

describe('the table of figures', () => {
  it('has the catalogue\u2019s order, then keys it does not know, and a cell for each channel', () => {
    const { rows, channels } = buildFigureTable(makeRecord());
    expect(channels).toEqual(['left', 'right']);
    expect(rows.map(({ key }) => key)).toEqual([
      'fundamentalFrequencyHz',
      'fundamentalLevelDbfs',
      'thdDb',
      'snrDb',
      'oddityDb',
    ]);
    expect(rows.at(-1)!.cells[1]!.value).toBeUndefined();
  });

  it('says under which conditions a figure holds', () => {
    const { rows } = buildFigureTable(makeRecord());
    expect(rows.find(({ key }) => key === 'thdDb')!.conditions).toBe('harmonics 2 to 10');
  });

  it('keeps columns wide enough that every point stands under the others', () => {
    const table = buildFigureTable(makeRecord());
    expect(table.integerCh).toBe('\u2212132'.length + 1); // with the sign of a bound
    expect(table.fractionCh).toBe('.0'.length);
    expect(table.uncertaintyCh).toBe('bound'.length);
  });

  it('names the marks it uses, so that the key holds these and no others', () => {
    expect([...buildFigureTable(makeRecord()).worths].sort()).toEqual([
      'at',
      'floor-unknown',
      'near',
      'not-measured',
    ]);
  });

  it('finds why a figure is missing: in the warning that names it for this channel or for all', () => {
    const warnings = [
      {
        code: 'stimulus-assumed' as const,
        channel: 'left',
        figures: ['snrDb'],
        message: 'Too many harmonics.',
      },
    ];
    const snr = buildFigureTable(makeRecord({ warnings })).rows.find(({ key }) => key === 'snrDb')!;
    expect(snr.cells.map(({ missingWhy }) => missingWhy)).toEqual(['Too many harmonics.', null]);
  });

  it('shows the rig alone only where the record was made against a baseline', () => {
    expect(buildFigureTable(makeRecord()).hasRig).toBe(false);
    const baseline = {
      channels: [{ channel: 'left', figures: { thdDb: -128.8 } }],
    } as unknown as BenchRecord;
    const settings = { ...makeRecord().settings, baseline };
    const table = buildFigureTable(makeRecord({ settings }));
    expect(table.hasRig).toBe(true);
    expect(table.rows.find(({ key }) => key === 'thdDb')!.rig).toEqual({ value: -128.8, channel: 'left' });
  });
});
