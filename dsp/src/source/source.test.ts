import { describe, expect, it } from 'vitest';
import { channelName } from './channel-name.js';
import { findNonFinite } from './find-non-finite.js';
import { openMemorySource } from './open-memory-source.js';
import { selectChannels } from './select-channels.js';
import { sliceSource } from './slice-source.js';

const left = Float64Array.of(0, 0.25, 0.5, 0.75, 1);
const right = Float64Array.of(0, -0.25, -0.5, -0.75, -1);
const stereo = () => openMemorySource([left, right], 48_000);

describe('a source in memory', () => {
  it('states what it holds and reads runs, fewer frames at the end, none past it', async () => {
    const source = stereo();
    expect(source).toMatchObject({ sampleRateHz: 48_000, channelCount: 2, frameCount: 5 });
    expect(await source.read(1, 2)).toEqual([Float64Array.of(0.25, 0.5), Float64Array.of(-0.25, -0.5)]);
    expect(await source.read(3, 99)).toEqual([Float64Array.of(0.75, 1), Float64Array.of(-0.75, -1)]);
    expect(await source.read(5, 10)).toEqual([new Float64Array(), new Float64Array()]);
  });

  it('hands out copies: a caller may change them', async () => {
    const source = stereo();
    const [run] = await source.read(0, 5);
    run.fill(9);
    expect((await source.read(0, 5))[0]).toEqual(left);
  });

  it('refuses a NaN or an Infinity at the first frame that has one, whatever its channel', async () => {
    const faulty = openMemorySource(
      [Float64Array.of(0, 0, 0, NaN), Float64Array.of(0, 0, -Infinity, 0)],
      48_000,
    );
    await expect(faulty.read(1, 3)).rejects.toMatchObject({
      code: 'NON_FINITE_SAMPLE',
      message: 'frame 2 of the channel right is -Infinity',
    });
    expect((await faulty.read(0, 2))[0]).toHaveLength(2);
  });

  it.each([
    { fromFrame: -1, count: 1 },
    { fromFrame: 6, count: 1 },
    { fromFrame: 0.5, count: 1 },
    { fromFrame: 0, count: -1 },
    { fromFrame: 0, count: NaN },
  ])('rejects a run from $fromFrame of $count', async ({ fromFrame, count }) => {
    await expect(stereo().read(fromFrame, count)).rejects.toMatchObject({ code: 'OUT_OF_RANGE' });
  });

  it('refuses no channels, uneven channels and a rate that can not be', () => {
    const refusal = expect.objectContaining({ code: 'BAD_ARGUMENT' });
    expect(() => openMemorySource([], 48_000)).toThrow(refusal);
    expect(() => openMemorySource([left, right.subarray(1)], 48_000)).toThrow(refusal);
    expect(() => openMemorySource([left], 0)).toThrow(refusal);
    expect(() => openMemorySource([left], Infinity)).toThrow(refusal);
  });
});

describe('a part of a source', () => {
  it('counts frames from its own start and ends where it ends', async () => {
    const part = sliceSource(stereo(), 1, 4);
    expect(part).toMatchObject({ sampleRateHz: 48_000, channelCount: 2, frameCount: 3 });
    expect((await part.read(0, 99))[0]).toEqual(Float64Array.of(0.25, 0.5, 0.75));
    expect((await part.read(2, 99))[1]).toEqual(Float64Array.of(-0.75));
    await expect(part.read(4, 1)).rejects.toMatchObject({ code: 'OUT_OF_RANGE' });
  });

  it.each([
    [-1, 2],
    [3, 2],
    [0, 6],
    [0.5, 2],
    [0, 1.5],
    [0, NaN],
  ])('refuses %s to %s', (from, to) => {
    expect(() => sliceSource(stereo(), from, to)).toThrow(expect.objectContaining({ code: 'OUT_OF_RANGE' }));
  });
});

describe('some channels of a source', () => {
  it('gives them in the order asked for', async () => {
    expect(await selectChannels(stereo(), [1]).read(3, 2)).toEqual([Float64Array.of(-0.75, -1)]);
    expect(await selectChannels(stereo(), [1, 0]).read(4, 1)).toEqual([
      Float64Array.of(-1),
      Float64Array.of(1),
    ]);
    expect(selectChannels(stereo(), [0])).toMatchObject({
      channelCount: 1,
      frameCount: 5,
      sampleRateHz: 48_000,
    });
  });

  it('refuses none, one twice, and one that is not there', () => {
    expect(() => selectChannels(stereo(), [])).toThrow(expect.objectContaining({ code: 'BAD_ARGUMENT' }));
    expect(() => selectChannels(stereo(), [0, 0])).toThrow(expect.objectContaining({ code: 'BAD_ARGUMENT' }));
    expect(() => selectChannels(stereo(), [2])).toThrow(expect.objectContaining({ code: 'OUT_OF_RANGE' }));
    expect(() => selectChannels(stereo(), [-1])).toThrow(expect.objectContaining({ code: 'OUT_OF_RANGE' }));
  });
});

describe('small helpers of sources', () => {
  it('finds the first sample that is no finite number', () => {
    expect(findNonFinite(new Float64Array())).toBe(-1);
    expect(findNonFinite(Float64Array.of(1e308, -1e308, 0, -0, 5e-324))).toBe(-1);
    expect(findNonFinite(Float64Array.of(0, Infinity, NaN))).toBe(1);
    expect(findNonFinite(Float64Array.of(0, 0, NaN))).toBe(2);
  });

  it('names channels as records do', () => {
    expect([0, 1, 2, 31].map(channelName)).toEqual(['left', 'right', 'ch3', 'ch32']);
  });
});
