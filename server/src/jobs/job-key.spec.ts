import { jobKey } from './job-key';

describe('jobKey', () => {
  const settings = { bandLowHz: 20, bandHighHz: 20_000 };

  it('is the same for the same request, however its keys are ordered', () => {
    const other = { bandHighHz: 20_000, bandLowHz: 20, fromS: undefined };
    expect(jobKey({ measure: null, settings: other }, '1')).toBe(jobKey({ measure: null, settings }, '1'));
  });

  it('differs with measure, settings and dsp version', () => {
    const keys = [
      jobKey({ measure: null, settings }, '1'),
      jobKey({ measure: 'tone', settings }, '1'),
      jobKey({ measure: null, settings: { ...settings, bandLowHz: 21 } }, '1'),
      jobKey({ measure: null, settings }, '2'),
    ];
    expect(new Set(keys).size).toBe(4);
  });
});
