import { figuresCsv } from './figures-csv';
import type { StoredRecord } from './stored-record';

const record = {
  measure: 'tone',
  settings: { fromS: 0, toS: 5 },
  channels: [
    {
      channel: '=cmd()',
      figures: { thdDb: -98.5, noiseDbfs: null, 'odd, "key"': 'same' },
      limits: { thdDb: { by: 'noise', marginDb: 3.5 } },
      uncertainty: { thdDb: { expanded: 0.2 } },
      traces: {},
    },
  ],
  between: { figures: { interchannelPolarity: 'same' }, traces: {} },
  segments: [],
} as unknown as StoredRecord;

describe('figuresCsv', () => {
  const lines = figuresCsv(record).split('\r\n');

  it('writes one line a figure, with its limit and uncertainty', () => {
    expect(lines[1]).toBe(`0,tone,'=cmd(),thdDb,-98.5,dB,noise,3.5,0.2,0,5`);
    expect(lines[2]).toBe(`0,tone,'=cmd(),noiseDbfs,,dBFS,,,,0,5`);
    expect(lines[4]).toBe('0,tone,between,interchannelPolarity,same,,,,,0,5');
  });

  it('quotes after RFC 4180 and turns formulas into text', () => {
    expect(lines[3]).toBe(`0,tone,'=cmd(),"odd, ""key""",same,,,,,0,5`);
    expect(lines.at(-1)).toBe('');
  });
});
