import { describe, expect, it } from 'vitest';
import { createStimulus } from './create-stimulus.js';
import { parseDescriptor } from './parse-descriptor.js';

const described = () =>
  JSON.parse(
    JSON.stringify(
      createStimulus('sine', { sampleRateHz: 44_100, bitsPerSample: '32f' }).describe('ab'.repeat(32)),
    ),
  ) as Record<string, unknown>;

describe('a descriptor', () => {
  it('comes back from JSON as it was written', () => {
    const json = described();
    expect(parseDescriptor(json)).toEqual(json);
    expect(Object.keys(json)).toEqual([
      'schema',
      'name',
      'parameters',
      'sampleRateHz',
      'bitsPerSample',
      'dither',
      'seed',
      'channels',
      'frameCount',
      'sha256',
      'marks',
      'parts',
    ]);
  });

  it('may be described before its file is written', () => {
    expect(parseDescriptor({ ...described(), sha256: '' }).sha256).toBe('');
  });

  it.each([
    { change: { schema: 'benchlark-stimulus/2' }, key: 'schema' },
    { change: { name: '' }, key: 'name' },
    { change: { parameters: { frequencyHz: null } }, key: 'parameters.frequencyHz' },
    { change: { sampleRateHz: -1 }, key: 'sampleRateHz' },
    { change: { bitsPerSample: 20 }, key: 'bitsPerSample' },
    { change: { dither: 'shaped' }, key: 'dither' },
    { change: { seed: 0.5 }, key: 'seed' },
    { change: { channels: 'ch3' }, key: 'channels' },
    { change: { frameCount: 0 }, key: 'frameCount' },
    { change: { sha256: 'AB' }, key: 'sha256' },
    { change: { marks: [{ kind: 'middle', atS: 1 }] }, key: 'marks.0.kind' },
    { change: { marks: [{ kind: 'end', atS: -1 }] }, key: 'marks.0.atS' },
    { change: { parts: [{ measure: 'taste' }] }, key: 'parts.0' },
    { change: { parts: undefined }, key: 'parts' },
  ])('is refused at $key', ({ change, key }) => {
    const call = () => parseDescriptor({ ...described(), ...change });
    expect(call).toThrow(expect.objectContaining({ code: 'BAD_DESCRIPTOR' }));
    expect(call).toThrow(` at ${key}`);
  });

  it.each([null, 3, [], 'text'])('is refused when it is %j', (json) => {
    expect(() => parseDescriptor(json)).toThrow(expect.objectContaining({ code: 'BAD_DESCRIPTOR' }));
  });
});
