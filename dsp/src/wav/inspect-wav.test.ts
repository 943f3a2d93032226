import { describe, expect, it } from 'vitest';
import { inspectWav } from './inspect-wav.js';
import { openWav } from './open-wav.js';
import { bytesFromBlob, bytesFromMemory } from './random-access-bytes.js';
import { chunk, fmt, hex, plainWav, riff } from './testing/wav-bytes.js';
import { captureFactsOf } from './wav-file.js';

const inspect = async (bytes: Uint8Array) => inspectWav(await openWav(bytesFromMemory(bytes)));

describe('looking at every sample', () => {
  it('gives peaks and counts of each channel', async () => {
    const bytes = riff([
      chunk('fmt ', fmt({ channels: 2 })),
      chunk('data', hex('0080 0040 ff7f 0000 fe7f 00e0 0180 0000')),
    ]);
    expect(await inspect(bytes)).toEqual({
      peakFs: [1, 0.5],
      fullScaleCounts: [2, 0],
      overCounts: [0, 0],
      warnings: [],
    });
  });

  it('counts what float holds beyond full scale, and warns', async () => {
    const samples = hex('0000803f 000080bf 0000c03f 000020c0');
    const inspection = await inspect(
      riff([chunk('fmt ', fmt({ tag: 3, bits: 32 })), chunk('data', samples)]),
    );
    expect(inspection).toMatchObject({ peakFs: [2.5], fullScaleCounts: [2], overCounts: [2] });
    expect(inspection.warnings).toMatchObject([{ code: 'over-full-scale', channel: 'left' }]);
    expect(inspection.warnings[0].message).toContain(
      'left has 2 samples beyond full scale, up to 2.500 times',
    );
  });

  it('warns when samples use bits that the header calls unused', async () => {
    const file = (samples: string): Uint8Array =>
      riff([chunk('fmt ', fmt({ bits: 32, extensible: { validBits: 24 } })), chunk('data', hex(samples))]);
    expect((await inspect(file('00ffff7f 00000080'))).warnings).toEqual([]);
    expect((await inspect(file('00ffff7f 00000080'))).fullScaleCounts).toEqual([2]);
    expect((await inspect(file('00000040 01000040'))).warnings).toMatchObject([
      { code: 'valid-bits-exceeded' },
    ]);
  });

  it('keeps the warnings of the header', async () => {
    expect((await inspect(plainWav().slice(0, -1))).warnings.map(({ code }) => code)).toEqual([
      'file-size-lies',
      'last-frame-cut',
    ]);
  });

  it('refuses a file with a NaN far inside, by its byte', async () => {
    const samples = new Uint8Array(new Float32Array(200_000).fill(0.25).buffer);
    samples.set(hex('0000c07f'), 4 * 150_000);
    const bytes = riff([chunk('fmt ', fmt({ tag: 3, bits: 32 })), chunk('data', Array.from(samples))]);
    await expect(inspect(bytes)).rejects.toMatchObject({
      code: 'NON_FINITE_SAMPLE',
      details: { offset: 44 + 600_000 },
    });
  });

  it('tells its progress, and stops when asked to', async () => {
    const data = Array<number>(400_000).fill(0);
    const wav = await openWav(bytesFromMemory(riff([chunk('fmt ', fmt()), chunk('data', data)])));
    const shares: number[] = [];
    await inspectWav(wav, { onProgress: (share) => shares.push(share) });
    expect(shares).toEqual([...shares].sort((one, other) => one - other));
    expect(shares.at(-1)).toBe(1);
    expect(shares.length).toBeGreaterThan(2);
    const signal = { aborted: false };
    const stopped = inspectWav(wav, { signal, onProgress: () => (signal.aborted = true) });
    await expect(stopped).rejects.toMatchObject({ code: 'CANCELLED' });
  });
});

describe('around an opened file', () => {
  it('states the facts of the capture', async () => {
    const wav = await openWav(bytesFromMemory(plainWav()));
    expect(captureFactsOf(wav, 'ab12')).toEqual({
      sha256: 'ab12',
      sampleRateHz: 48_000,
      channelCount: 1,
      bitsPerSample: 16,
      sampleFormat: 'integer',
      frameCount: 4,
      durationS: 4 / 48_000,
    });
  });

  it('reads a Blob as it reads memory', async () => {
    const wav = await openWav(bytesFromBlob(new Blob([plainWav().slice().buffer])));
    expect(await wav.read(1, 2)).toEqual([Float64Array.of(-0.5, 0)]);
  });

  it('reads runs longer than a block, from an odd place', async () => {
    const bytes = encodeRamp(700_000);
    const shifted = new Uint8Array(bytes.length + 1);
    shifted.set(bytes, 1);
    const wav = await openWav(bytesFromMemory(shifted.subarray(1)));
    const [run] = await wav.read(3, 699_990);
    expect(run.every((sample, n) => sample === ((n + 3) % 30_000) / 32_768)).toBe(true);
    expect(run).toHaveLength(699_990);
  });
});

function encodeRamp(length: number): Uint8Array {
  const codes = Int16Array.from({ length }, (_, n) => n % 30_000);
  const head = riff([chunk('fmt ', fmt()), chunk('data', [], { size: 2 * length })], {
    size: 36 + 2 * length,
  });
  const bytes = new Uint8Array(head.length + 2 * length);
  bytes.set(head);
  bytes.set(new Uint8Array(codes.buffer), head.length);
  return bytes;
}
