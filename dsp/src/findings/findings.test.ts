import { describe, expect, it } from 'vitest';
import { getMeasure } from '../measures/registry.js';
import { analyseSamples } from '../measures/testing/analyse-samples.js';
import { resampleByFft } from '../measures/testing/resample.js';
import type { PracticeStage } from '../practice/device.js';
import { PRACTICE_DEVICES } from '../practice/practice-devices.js';
import { pass } from '../practice/testing/pass.js';
import { parseRecord } from '../record/parse-record.js';
import type { Finding } from '../record/record.js';
import { toRecordJson } from '../record/to-record-json.js';
import { createStimulus } from '../stimulus/create-stimulus.js';
import { fitSine } from '../tone/fit-sine.js';
import { clipForDeviation, oneSidedFundamental, twoSidedFundamental } from './clip-forms.js';
import { proposeFindings } from './propose-findings.js';
import { findIn, type PlayOptions } from './testing/find-in.js';

// What a device was told to do is the truth; thresholds are closed forms of it.

const noise = (levelDbfs: number): PracticeStage => ({ kind: 'noise', channel: 'both', levelDbfs });
const steps: PlayOptions = { name: 'level-steps', measure: 'level-steps' };

function only(findings: readonly Finding[], code: string): Finding {
  const found = findings.filter((finding) => finding.code === code);
  if (found.length !== 1) {
    throw new Error(`${found.length} of ${code} among ${findings.map((finding) => finding.code).join(', ')}`);
  }
  return found[0];
}

const codesOf = (findings: readonly Finding[], severities = ['caution', 'fault']): string[] =>
  findings.filter(({ severity }) => severities.includes(severity)).map(({ code }) => code);

describe('the fundamentals of clipped sines', () => {
  // Published closed forms: one-sided 0.9 gives h1 0.981307, two-sided 0.9 gives 0.962614.
  it('are as published, and can be turned round', () => {
    expect(oneSidedFundamental(0.9)).toBeCloseTo(0.981307, 6);
    expect(twoSidedFundamental(0.9)).toBeCloseTo(0.962614, 6);
    expect(oneSidedFundamental(0.5)).toBeCloseTo(0.804499, 6);
    expect(twoSidedFundamental(0.5)).toBeCloseTo(0.608998, 6);
    for (const c of [0.3, 0.763, 0.95]) {
      expect(clipForDeviation(oneSidedFundamental, 20 * Math.log10(oneSidedFundamental(c)))).toBeCloseTo(
        c,
        9,
      );
      expect(clipForDeviation(twoSidedFundamental, 20 * Math.log10(twoSidedFundamental(c)))).toBeCloseTo(
        c,
        9,
      );
    }
  });
});

describe('a clipped half', () => {
  it.each([
    { positive: 0.763, negative: 2, half: 'positive' },
    { positive: 2, negative: 0.763, half: 'negative' },
    { positive: 0.9, negative: 2, half: 'positive' },
    { positive: 0.5, negative: 2, half: 'positive' },
  ] as const)(
    'at $positive and $negative is named with its threshold',
    async ({ positive, negative, half }) => {
      const { findings } = await findIn(
        [
          { kind: 'clip', channel: 'left', positive, negative },
          { kind: 'gain', channel: 'both', gainDb: -5 },
          noise(-105),
        ],
        steps,
      );
      const finding = only(findings, 'one-sided-clipping');
      expect(finding).toMatchObject({ channel: 'left', half, severity: 'fault' });
      // Recovered within 0.1 dB.
      const knee = 20 * Math.log10(Math.min(positive, negative));
      expect(Math.abs((finding.fromStimulusDbfs ?? 0) - knee)).toBeLessThan(0.1);
    },
  );

  it('is told in the recording’s polarity', async () => {
    const { findings } = await findIn(
      [
        { kind: 'clip', channel: 'both', positive: 0.763, negative: 2 },
        { kind: 'polarity', channel: 'both' },
        noise(-105),
      ],
      steps,
    );
    expect(findings.filter(({ code }) => code === 'one-sided-clipping').map(({ half }) => half)).toEqual([
      'negative',
      'negative',
    ]);
  });

  it('on both halves alike is symmetric, with its own threshold', async () => {
    const { findings } = await findIn(
      [{ kind: 'clip', channel: 'right', positive: 0.8, negative: 0.8 }, noise(-105)],
      steps,
    );
    const finding = only(findings, 'symmetric-clipping');
    expect(finding.channel).toBe('right');
    expect(Math.abs((finding.fromStimulusDbfs ?? 0) - 20 * Math.log10(0.8))).toBeLessThan(0.1);
  });

  it.each([
    { knee: 1, positive: 0.8 },
    { knee: 2, positive: 0.85 },
    { knee: 3, positive: 0.9 },
  ])('with a soft knee of $knee dB is placed where it costs 0.1 dB', async ({ knee, positive }) => {
    const stages: PracticeStage[] = [
      { kind: 'soft-clip', channel: 'left', positive, negative: 2, kneeDb: knee },
      noise(-105),
    ];
    const { findings } = await findIn(stages, steps);
    const finding = only(findings, 'one-sided-clipping');
    // The truth by single tones 0.1 dB apart through the same stage: the first whose fundamental falls 0.1 dB short.
    let truth = 0;
    for (let level = -6; level <= 0; level += 0.05) {
      const tone = Float64Array.from(
        { length: 9600 },
        (_, n) => 10 ** (level / 20) * Math.sin((2 * Math.PI * 1000 * n) / 48_000),
      );
      const [out] = pass([tone, tone], 48_000, stages.slice(0, 1));
      const short = 20 * Math.log10(fitSine(out, 48_000, 1000).amplitude) - level;
      if (short <= -0.1) {
        truth = level;
        break;
      }
    }
    expect(Math.abs((finding.fromStimulusDbfs ?? 0) - truth)).toBeLessThan(0.2);
  });

  it('joins steps, two tones and residual of a whole programme in one finding', async () => {
    const { findings } = await findIn(
      [{ kind: 'clip', channel: 'left', positive: 0.763, negative: 2 }, noise(-105)],
      { isQuick: false },
    );
    const finding = only(findings, 'one-sided-clipping');
    const words = finding.evidence.map(({ figure }) => figure).join('; ');
    expect(words).toMatch(/deviation at 0.0 dBFS/);
    expect(words).toMatch(/residual/);
    expect(words).toMatch(/modulation distortion/);
    expect(finding.summary).toContain('-2.35 dBFS');
    expect(finding.confirmBy).toMatch(/load/);
  });

  it('shows in a single tone too', async () => {
    const { findings } = await findIn(
      [{ kind: 'clip', channel: 'left', positive: 2, negative: 0.763 }, noise(-105)],
      { name: 'sine', measure: 'tone' },
    );
    expect(only(findings, 'one-sided-clipping')).toMatchObject({ half: 'negative', fromStimulusDbfs: null });
  });

  it('is not told where the recorder itself is clipped', async () => {
    const { findings } = await findIn(
      [
        { kind: 'gain', channel: 'both', gainDb: 3 },
        { kind: 'clip', channel: 'both', positive: 1, negative: 1 },
        { kind: 'quantise', channel: 'both', bits: 24, dither: 'none' },
      ],
      steps,
    );
    expect(codesOf(findings)).toContain('recording-overloaded');
    expect(codesOf(findings)).not.toContain('symmetric-clipping');
  });
});

describe('other bends', () => {
  it('a cube is compression without a knee', async () => {
    const { findings } = await findIn(
      [{ kind: 'polynomial', channel: 'both', coefficients: [1, 0, -0.05] }, noise(-105)],
      steps,
    );
    expect(findings.filter(({ code }) => code === 'level-compression')).toHaveLength(2);
    expect(codesOf(findings)).not.toContain('symmetric-clipping');
  });

  it('a dead zone is crossover distortion', async () => {
    const { findings } = await findIn(
      [{ kind: 'dead-zone', channel: 'right', width: 1e-3 }, noise(-110)],
      steps,
    );
    expect(only(findings, 'crossover-distortion').channel).toBe('right');
  });

  it('16 bits without dither are truncation', async () => {
    const { findings } = await findIn(
      [{ kind: 'quantise', channel: 'both', bits: 16, dither: 'none' }, noise(-115)],
      steps,
    );
    expect(codesOf(findings)).toEqual(['truncation', 'truncation']);
  });

  it('16 bits with dither are nothing', async () => {
    const { findings } = await findIn(
      [{ kind: 'quantise', channel: 'both', bits: 16, dither: 'tpdf' }],
      steps,
    );
    expect(codesOf(findings)).toEqual([]);
  });
});

describe('findings of a whole programme', () => {
  it.each([
    {
      code: 'mains-hum',
      stage: { kind: 'hum', channel: 'left', frequencyHz: 50, levelsDbfs: [-80, -90, -85] },
    },
    { code: 'frame-noise', stage: { kind: 'tone', channel: 'both', frequencyHz: 8000, levelDbfs: -95 } },
    { code: 'jitter', stage: { kind: 'jitter', channel: 'both', peakToPeakPs: 2000, frequencyHz: 200 } },
    {
      code: 'early-roll-off',
      stage: { kind: 'filter', channel: 'both', type: 'low-pass', frequencyHz: 15_000, order: 2 },
    },
    { code: 'inverted-polarity', stage: { kind: 'polarity', channel: 'both' } },
    { code: 'inverted-polarity', stage: { kind: 'polarity', channel: 'right' } },
    {
      code: 'joined-channels',
      stage: { kind: 'crosstalk', channel: 'both', levelDb: -6, slopeDbPerOctave: 0 },
    },
    { code: 'channel-imbalance', stage: { kind: 'gain', channel: 'right', gainDb: -1 } },
    { code: 'dc-offset', stage: { kind: 'offset', channel: 'left', value: 0.01 } },
  ] as const)('$code is named, and nothing else above a note', async ({ code, stage }) => {
    // The recorder is given headroom, so that nothing is its own.
    const headroom: PracticeStage = { kind: 'gain', channel: 'both', gainDb: -8 };
    const { findings } = await findIn([headroom, stage, noise(-105)]);
    expect([...new Set(codesOf(findings))]).toEqual([code]);
    for (const finding of findings) {
      expect(finding.summary.length).toBeGreaterThan(20);
      expect(finding.confirmBy.length).toBeGreaterThan(20);
      for (const { value } of finding.evidence) expect(Number.isFinite(value)).toBe(true);
    }
  });

  it('exchanged channels are named', async () => {
    const { source } = createStimulus('separation', { sampleRateHz: 48_000, bitsPerSample: 24 });
    const [left, right] = pass(await source.read(0, source.frameCount), 48_000, [noise(-105)]);
    const record = await analyseSamples(getMeasure('separation'), [right, left], 48_000);
    expect(codesOf(proposeFindings(record))).toEqual(['swapped-channels']);
  });

  it('a converter without room between the samples is named', async () => {
    const { source } = createStimulus('intersample-tone', { sampleRateHz: 48_000, bitsPerSample: 24 });
    const heard = resampleByFft((await source.read(0, source.frameCount))[0], 48_000, 96_000);
    const channels = pass([heard, heard], 96_000, [
      { kind: 'clip', channel: 'left', positive: 1.1, negative: 1.1 },
      { kind: 'gain', channel: 'both', gainDb: -6 },
      noise(-110),
    ]);
    const record = await analyseSamples(getMeasure('intersample'), channels, 96_000);
    expect(only(proposeFindings(record), 'intersample-overload')).toMatchObject({ channel: 'left' });
  });

  it('a filter that leaves images is named', async () => {
    const { source } = createStimulus('white-noise', { sampleRateHz: 48_000, bitsPerSample: 24 });
    const [played] = await source.read(0, source.frameCount);
    // Every sample held for two: the plainest converter there is, images and all (sin x / x).
    const held = Float64Array.from({ length: 2 * played.length }, (_, n) => played[n >> 1]);
    const record = await analyseSamples(getMeasure('filter'), [held, held], 96_000, {
      descriptor: createStimulus('white-noise', { sampleRateHz: 48_000, bitsPerSample: 24 }).describe(''),
    });
    expect(proposeFindings(record).map(({ code }) => code)).toContain('image-products');
  });

  it('a recording whose word length sets its noise is a note', async () => {
    const { findings } = await findIn([{ kind: 'quantise', channel: 'both', bits: 16, dither: 'tpdf' }], {
      bits: 16,
    });
    expect(
      findings.filter(({ code }) => code === 'recording-noise-limited').map(({ severity }) => severity),
    ).toEqual(['note', 'note']);
  });

  // Common practice, no source: the inexpensive converter, faulty and mended.
  it('of the pinched converter is its clipping; of the plain and the mended one nothing above a note', async () => {
    const stagesOf = (name: string) => PRACTICE_DEVICES[name].stages;
    const pinched = await findIn(stagesOf('pinched-converter'));
    expect(codesOf(pinched.findings)).toEqual(['one-sided-clipping']);
    for (const name of ['plain-converter', 'mended-converter', 'clean']) {
      expect(codesOf((await findIn(stagesOf(name))).findings)).toEqual([]);
    }
  });

  it('is the same from a record that was stored and read back with reduced traces', async () => {
    const { record, findings } = await findIn([
      { kind: 'clip', channel: 'left', positive: 0.763, negative: 2 },
      { kind: 'hum', channel: 'left', frequencyHz: 50, levelsDbfs: [-80] },
      noise(-105),
    ]);
    const stored = parseRecord(JSON.parse(JSON.stringify(toRecordJson(record, { traces: 'reduced' }))));
    expect(proposeFindings(stored).map(({ code, channel, half }) => ({ code, channel, half }))).toEqual(
      findings.map(({ code, channel, half }) => ({ code, channel, half })),
    );
  });
});
