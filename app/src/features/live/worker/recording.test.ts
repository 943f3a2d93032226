import { createHash } from 'node:crypto';
import { bytesFromMemory, openWav, PRACTICE_DESCRIPTION } from '@benchlark/dsp';
import { describe, expect, it } from 'vitest';
import { longestCleanStretch } from './clean-stretch';
import { Recording } from './recording';

const ABOUT = { description: 'Heron, as received', isPractice: false, startedAt: '2026-03-04T05:06:07.000Z' };

function filled(blocks: number, mostFrames?: number): Recording {
  const recording = new Recording(48_000, 2, mostFrames);
  for (let block = 0; block < blocks; block += 1) {
    const at = (n: number) => (block * 100 + n) / 1e4;
    recording.push([
      Float32Array.from({ length: 100 }, (_, n) => at(n)),
      Float32Array.from({ length: 100 }, (_, n) => -at(n)),
    ]);
  }
  return recording;
}

async function read(wav: Blob) {
  return openWav(bytesFromMemory(new Uint8Array(await wav.arrayBuffer())));
}

describe('a recording', () => {
  it('becomes a WAV file of the very samples, whose hash is that of its bytes', async () => {
    const { wav, sha256 } = filled(3).toWav(ABOUT);
    const bytes = Buffer.from(await wav.arrayBuffer());
    expect(createHash('sha256').update(bytes).digest('hex')).toBe(sha256);
    const file = await read(wav);
    expect(file.frameCount).toBe(300);
    expect(file.format).toMatchObject({ bitsPerSample: 32, sampleFormat: 'float' });
    const [left, right] = await file.read(0, 300);
    expect(left?.[299]).toBe(Math.fround(0.0299));
    expect(right?.[1]).toBe(Math.fround(-0.0001));
    expect(file.broadcast).toMatchObject({ description: 'Heron, as received', originationTime: '05:06:07' });
  });

  it('says in the file that it was practice', async () => {
    const file = await read(filled(1).toWav({ ...ABOUT, isPractice: true }).wav);
    expect(file.broadcast?.description).toBe(`${PRACTICE_DESCRIPTION} Heron, as received`);
  });

  it('keeps no more than it was told to, and gives the newest', () => {
    const recording = filled(10, 250);
    expect(recording.frames).toBe(300);
    const [left] = recording.newest(150).toChannels(1000);
    expect(left).toHaveLength(150);
    expect(left?.[0]).toBeCloseTo(0.085, 6);
    expect(left?.[149]).toBeCloseTo(0.0999, 6);
  });
});

describe('the longest stretch without damage', () => {
  it.each([
    { breaks: [], from: 0, to: 1000 },
    { breaks: [[100, 200]], from: 200, to: 1000 },
    {
      breaks: [
        [700, 710],
        [300, 310],
      ],
      from: 310,
      to: 700,
    },
    {
      breaks: [
        [0, 600],
        [500, 990],
      ],
      from: 990,
      to: 1000,
    },
  ])('lies between $breaks', ({ breaks, from, to }) => {
    const spans = breaks.map(([fromFrame = 0, toFrame = 0]) => ({ fromFrame, toFrame }));
    expect(longestCleanStretch(1000, spans)).toEqual({ fromFrame: from, toFrame: to });
  });
});
