/** Builds WAV files byte by byte for tests, right or wrong as wanted, with nothing of the writer under test. */

export const FLOAT_GUID = '03 00 00 00 00 00 10 00 80 00 00 aa 00 38 9b 71';
export const PCM_GUID = '01 00 00 00 00 00 10 00 80 00 00 aa 00 38 9b 71';

export const hex = (text: string): number[] =>
  (text.match(/[0-9a-f]{2}/gi) ?? []).map((byte) => Number.parseInt(byte, 16));
export const ascii = (text: string): number[] => Array.from(text, (letter) => letter.charCodeAt(0));
export const u16 = (value: number): number[] => [value & 255, (value >>> 8) & 255];
export const u32 = (value: number): number[] => [...u16(value & 0xffff), ...u16(value >>> 16)];
export const u64 = (value: bigint): number[] =>
  Array.from({ length: 8 }, (_, n) => Number((value >> BigInt(8 * n)) & 255n));

export interface FormatFields {
  tag?: number;
  channels?: number;
  rateHz?: number;
  byteRate?: number;
  blockAlign?: number;
  bits?: number;
  extensible?: { cbSize?: number; validBits?: number; mask?: number; guid?: string };
}

/** Content of a fmt chunk: mono 48 kHz 16-bit PCM, changed as asked. */
export function fmt(fields: FormatFields = {}): number[] {
  const { channels = 1, rateHz = 48_000, bits = 16, extensible } = fields;
  const blockAlign = fields.blockAlign ?? (channels * bits) / 8;
  const content = [
    ...u16(fields.tag ?? (extensible ? 0xfffe : 1)),
    ...u16(channels),
    ...u32(rateHz),
    ...u32(fields.byteRate ?? rateHz * blockAlign),
    ...u16(blockAlign),
    ...u16(bits),
  ];
  if (extensible === undefined) {
    return content;
  }
  const { cbSize = 22, validBits = bits, mask = 0, guid = PCM_GUID } = extensible;
  return [...content, ...u16(cbSize), ...u16(validBits), ...u32(mask), ...hex(guid)];
}

/** A chunk with its head and pad byte; size and pad can be made wrong. */
export function chunk(
  id: string,
  content: number[],
  wrong: { size?: number; pad?: number[] } = {},
): number[] {
  const pad = wrong.pad ?? (content.length % 2 === 1 ? [0] : []);
  return [...ascii(id), ...u32(wrong.size ?? content.length), ...content, ...pad];
}

/** A file of chunks in the order given. */
export function riff(
  chunks: number[][],
  wrong: { id?: string; form?: string; size?: number } = {},
): Uint8Array {
  const body = [...ascii(wrong.form ?? 'WAVE'), ...chunks.flat()];
  return Uint8Array.from([...ascii(wrong.id ?? 'RIFF'), ...u32(wrong.size ?? body.length), ...body]);
}

/** Four 16-bit samples: 0.5, -0.5, 0, -1. */
export const SAMPLES_16 = hex('00 40 00 c0 00 00 00 80');

/** The plainest right file: mono 48 kHz 16-bit, those four samples. */
export const plainWav = (): Uint8Array => riff([chunk('fmt ', fmt()), chunk('data', SAMPLES_16)]);
