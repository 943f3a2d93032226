import { describe, expect, it } from 'vitest';
import { createRandom } from '../random/create-random.js';
import { mix, synthesise, whiteNoise } from '../testing/signals.js';
import { type Break, createBreakDetector } from './break-detector.js';

const RATE_HZ = 48_000;
const NOISE_RMS = Math.SQRT1_2 * 10 ** (-100 / 20);
const BLOCK = 512;

const tone = (seconds: number, ...hz: number[]) =>
  mix(
    synthesise(
      seconds * RATE_HZ,
      RATE_HZ,
      hz.map((frequencyHz) => ({ frequencyHz, amplitude: 0.5 / hz.length })),
    ),
    whiteNoise(seconds * RATE_HZ, NOISE_RMS, 3),
  );

function detect(
  samples: Float64Array,
  tones: readonly number[],
  changes: readonly [number, number][] = [],
): Break[] {
  const detector = createBreakDetector({ sampleRateHz: RATE_HZ });
  detector.setTones(tones);
  for (const [from, to] of changes) detector.expectChange(from, to);
  const found: Break[] = [];
  // A browser's floats, in its blocks.
  const floats = Float32Array.from(samples);
  for (let at = 0; at < floats.length; at += BLOCK) {
    const block = floats.subarray(at, at + BLOCK);
    found.push(...detector.push([block, block]));
  }
  return [...found, ...detector.end()];
}

/** Seven breaks of a browser's blocks: three zeroed, two dropped, two repeated. */
function damage(clean: Float64Array): { samples: Float64Array; places: [Break['kind'], number, number][] } {
  const random = createRandom(41);
  const lengths = [128, 512, 256, 1024, 128, 512, 1024];
  const kinds = ['zeroed', 'jump', 'repeated', 'zeroed', 'jump', 'zeroed', 'repeated'] as const;
  let rest = clean;
  const pieces: Float64Array[] = [];
  const places: [Break['kind'], number, number][] = [];
  let at = 0;
  kinds.forEach((kind, index) => {
    const length = lengths[index];
    const run = Math.floor((6 + random()) * RATE_HZ);
    pieces.push(rest.slice(0, run));
    at += run;
    if (kind === 'zeroed') pieces.push(new Float64Array(length));
    if (kind === 'repeated') pieces.push(rest.slice(run - length, run));
    places.push([kind, at, kind === 'jump' ? at : at + length]);
    at += kind === 'jump' ? 0 : length;
    rest = rest.slice(kind === 'repeated' ? run : run + length);
  });
  pieces.push(rest);
  const samples = new Float64Array(pieces.reduce((sum, piece) => sum + piece.length, 0));
  let from = 0;
  for (const piece of pieces) {
    samples.set(piece, from);
    from += piece.length;
  }
  return { samples, places };
}

describe('breaks in a tone', () => {
  it('are counted, told apart and placed: seven in a minute', () => {
    const { samples, places } = damage(tone(60, 997));
    const found = detect(samples, [997]);
    expect(found.map(({ kind }) => kind)).toEqual(places.map(([kind]) => kind));
    found.forEach(({ fromFrame, toFrame }, index) => {
      const [, from, to] = places[index];
      expect(Math.abs(fromFrame - from)).toBeLessThan(8);
      expect(Math.abs(toFrame - to)).toBeLessThan(8);
    });
  });

  it('are found between two tones as well', () => {
    const { samples, places } = damage(tone(60, 60, 7000));
    expect(detect(samples, [60, 7000]).map(({ kind }) => kind)).toEqual(places.map(([kind]) => kind));
  });

  it('are found zeroed or repeated in any signal', () => {
    const { samples, places } = damage(whiteNoise(60 * RATE_HZ, 0.1, 9));
    expect(detect(samples, []).map(({ kind }) => kind)).toEqual(
      places.map(([kind]) => kind).filter((kind) => kind !== 'jump'),
    );
  });
});

describe('no break', () => {
  const clipped = tone(20, 997).map((x) => Math.min(x, 0.4));
  const coded = tone(20, 997).map((x) => Math.round(x * 32_768) / 32_768);
  const sweep = Float64Array.from({ length: 10 * RATE_HZ }, (_, n) => {
    const t = n / RATE_HZ;
    return 0.3 * Math.sin(2 * Math.PI * 20 * 1.4 * Math.exp(t / 1.4));
  });
  it.each([
    { what: 'a tone', samples: tone(20, 997), tones: [997] },
    { what: 'a tone whose clock is 150 ppm off', samples: tone(20, 997.15), tones: [997] },
    { what: 'a tone that is cut off on one half', samples: clipped, tones: [997] },
    { what: 'a tone of 16 bits', samples: coded, tones: [997] },
    {
      what: 'a tone whose period divides every block',
      samples: synthesise(RATE_HZ, RATE_HZ, [{ frequencyHz: 1500, amplitude: 0.5 }]),
      tones: [1500],
    },
    { what: 'two tones', samples: tone(20, 19_000, 20_000), tones: [19_000, 20_000] },
    { what: 'noise', samples: whiteNoise(10 * RATE_HZ, 0.1, 4), tones: [] },
    { what: 'a sweep', samples: sweep, tones: [] },
    { what: 'digital silence', samples: new Float64Array(3 * RATE_HZ), tones: [] },
    {
      what: 'an idle input of two codes',
      samples: Float64Array.from({ length: RATE_HZ }, (_, n) => ((n >> 3) % 2) / 32_768),
      tones: [],
    },
  ])('in $what', ({ samples, tones }) => {
    expect(detect(samples, tones)).toEqual([]);
  });

  it('where a step was announced, but beyond it', () => {
    const samples = tone(10, 997);
    for (let n = 5 * RATE_HZ; n < samples.length; n++) samples[n] *= 0.5;
    expect(detect(samples, [997], [[5 * RATE_HZ - 480, 5 * RATE_HZ + 4800]])).toEqual([]);
    expect(detect(samples, [997]).length).toBe(1);
  });
});
