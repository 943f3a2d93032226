import { openMemorySource } from '@benchlark/dsp';
import { makeOverview, OVERVIEW_BINS_MAX } from './overview';

const ignore = () => undefined;

describe('makeOverview', () => {
  it.each([1, 2, 1_999, 2_000, 2_001, 70_000, 200_001])(
    'covers %i frames, each in one bin',
    async (frameCount) => {
      const samples = Float64Array.from({ length: frameCount }, (_, n) => Math.sin(n * 0.7) * 0.9);
      const source = openMemorySource([samples, samples.map((value) => -value)], 48_000);
      const { framesPerBin, channels } = await makeOverview(source, ignore);
      const bins = Math.ceil(frameCount / framesPerBin);
      expect(bins).toBeLessThanOrEqual(OVERVIEW_BINS_MAX);
      for (let bin = 0; bin < bins; bin++) {
        const run = samples.subarray(bin * framesPerBin, (bin + 1) * framesPerBin);
        // Four digits are kept.
        expect(channels[0]!.max[bin]).toBeCloseTo(Math.max(...run), 4);
        expect(channels[0]!.min[bin]).toBeCloseTo(Math.min(...run), 4);
        expect(channels[1]!.max[bin]).toBeCloseTo(-Math.min(...run), 4);
      }
    },
  );

  it('tells how far it is, up to the end', async () => {
    const shares: number[] = [];
    await makeOverview(openMemorySource([new Float64Array(150_000)], 48_000), (share) => shares.push(share));
    expect(shares).toEqual([...shares].sort((a, b) => a - b));
    expect(shares.at(-1)).toBe(1);
  });
});
