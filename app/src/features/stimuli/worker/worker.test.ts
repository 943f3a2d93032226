// @vitest-environment node
import { createHash } from 'node:crypto';
import { createStimulus, encodeWavBlocks } from '@benchlark/dsp';
import { describe, expect, it } from 'vitest';
import { previewStimulus } from './preview';
import { renderStimulus } from '@/lib/render-samples';
import { writeStimulus } from './write';

const OPTIONS = { sampleRateHz: 48_000, bitsPerSample: 16 } as const;

describe('what the worker makes', () => {
  it.each(['silence', 'jitter-test'])('%s has the bytes and the hash that dsp writes', async (name) => {
    const shares: number[] = [];
    const { wav, descriptor } = await writeStimulus(name, OPTIONS, {
      onProgress: (share) => shares.push(share),
      isCancelled: () => false,
    });
    const stimulus = createStimulus(name, OPTIONS);
    const hash = createHash('sha256');
    for await (const block of encodeWavBlocks(stimulus.source, stimulus.encoding)) hash.update(block);
    const expected = hash.digest('hex');
    // Node's own hash of dsp's own bytes, against the one told and against the file's.
    expect(descriptor.sha256).toBe(expected);
    const bytes = new Uint8Array(await wav.arrayBuffer());
    expect(createHash('sha256').update(bytes).digest('hex')).toBe(expected);
    expect(shares.at(-1)).toBe(1);
  });

  it('stops when it is told to', async () => {
    await expect(
      writeStimulus('sine', OPTIONS, { onProgress: () => undefined, isCancelled: () => true }),
    ).rejects.toMatchObject({ code: 'CANCELLED' });
  });

  it('hears a stop that comes as a message while it writes', async () => {
    let isCancelled = false;
    const shares: number[] = [];
    const writing = writeStimulus(
      'sine',
      { sampleRateHz: 192_000, bitsPerSample: 24 },
      {
        onProgress: (share) => {
          // A task of its own, as a message from the page is: seen only if writing lets tasks in.
          if (shares.length === 0) setTimeout(() => (isCancelled = true), 0);
          shares.push(share);
        },
        isCancelled: () => isCancelled,
      },
    );
    await expect(writing).rejects.toMatchObject({ code: 'CANCELLED' });
    expect(shares.at(-1)).toBeLessThan(0.5);
  });

  it('shows a file before it is made: its size, its whole, its line', async () => {
    const preview = await previewStimulus('sine', { ...OPTIONS, levelDbfs: -6 });
    const { wav } = await writeStimulus(
      'sine',
      { ...OPTIONS, levelDbfs: -6 },
      {
        onProgress: () => undefined,
        isCancelled: () => false,
      },
    );
    expect(preview.sizeBytes).toBe(wav.size);
    const { x, y } = preview.spectrum;
    const top = y.indexOf(y.reduce((most, level) => Math.max(most, level), -Infinity));
    expect(x[top]).toBeCloseTo(997, 0);
    // A sine of -6 dBFS; between bins the window loses at most 0.5 dB (its scalloping).
    expect(Math.abs((y[top] ?? 0) + 6)).toBeLessThan(0.5);
    const peak = Math.max(...preview.overview.channels.flatMap(({ max }) => [...max]));
    expect(20 * Math.log10(peak)).toBeCloseTo(-6, 2);
  });

  it('names what can’t be', async () => {
    await expect(previewStimulus('sine', { ...OPTIONS, levelDbfs: 3 })).rejects.toThrow('the level');
  });

  it('gives the same samples in floats, chunk by chunk, for playing', async () => {
    const { source } = createStimulus('sine', { ...OPTIONS, bitsPerSample: '32f', durationS: 2 });
    const [whole] = await source.read(0, source.frameCount);
    let at = 0;
    const told = await renderStimulus(
      'sine',
      { sampleRateHz: 48_000, durationS: 2 },
      ({ fromFrame, channels }) => {
        expect(fromFrame).toBe(at);
        const [left] = channels;
        expect(left?.[100]).toBe(Math.fround(whole?.[fromFrame + 100] ?? 0));
        at += left?.length ?? 0;
      },
    );
    expect(at).toBe(told.frameCount);
    expect(told.sampleRateHz).toBe(48_000);
  });
});
