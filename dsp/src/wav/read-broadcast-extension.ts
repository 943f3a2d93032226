import {
  BEXT_LAYOUT,
  type BroadcastExtension,
  type BroadcastLoudness,
  LOUDNESS_NOT_GIVEN,
} from './broadcast-extension.js';
import { viewOf } from './little-endian.js';

/**
 * Reads text that a stranger's file holds: up to the first zero byte, printable ASCII and line ends alone. What isn't
 * ASCII becomes U+FFFD, so that nothing hides; control characters are dropped.
 */
function readText(bytes: Uint8Array): string {
  const end = bytes.indexOf(0);
  return Array.from(end < 0 ? bytes : bytes.subarray(0, end), (byte) => {
    const isControl = byte < 0x20 || byte === 0x7f;
    return byte > 0x7f
      ? '\ufffd'
      : isControl && byte !== 0x0a && byte !== 0x0d
        ? ''
        : String.fromCharCode(byte);
  })
    .join('')
    .replace(/\r\n?/g, '\n')
    .trim();
}

function readLoudness(view: DataView): BroadcastLoudness {
  const figure = (index: number): number | null => {
    const hundredths = view.getInt16(BEXT_LAYOUT.loudness.offset + 2 * index, true);
    return hundredths === LOUDNESS_NOT_GIVEN ? null : hundredths / 100;
  };
  return {
    integratedLufs: figure(0),
    rangeLu: figure(1),
    maxTruePeakDbtp: figure(2),
    maxMomentaryLufs: figure(3),
    maxShortTermLufs: figure(4),
  };
}

/**
 * Reads the content of a `bext` chunk.
 *
 * @param bytes - at least `BEXT_FIXED_BYTES`; not modified
 * @see EBU Tech 3285 v2, 2.3 and 2.4
 */
export function readBroadcastExtension(bytes: Uint8Array): BroadcastExtension {
  const view = viewOf(bytes);
  const text = ({ offset, length }: { offset: number; length: number }): string =>
    readText(bytes.subarray(offset, offset + length));
  const umid = bytes.subarray(BEXT_LAYOUT.umid.offset, BEXT_LAYOUT.umid.offset + BEXT_LAYOUT.umid.length);
  const timeReference = view.getBigUint64(BEXT_LAYOUT.timeReference.offset, true);
  const version = view.getUint16(BEXT_LAYOUT.version.offset, true);
  return {
    description: text(BEXT_LAYOUT.description),
    originator: text(BEXT_LAYOUT.originator),
    originatorReference: text(BEXT_LAYOUT.originatorReference),
    originationDate: text(BEXT_LAYOUT.originationDate),
    originationTime: text(BEXT_LAYOUT.originationTime),
    timeReferenceFrames: timeReference <= BigInt(Number.MAX_SAFE_INTEGER) ? Number(timeReference) : null,
    version,
    umid: umid.every((byte) => byte === 0)
      ? null
      : Array.from(umid, (byte) => byte.toString(16).padStart(2, '0')).join(''),
    loudness: version >= 2 ? readLoudness(view) : null,
    codingHistory: readText(bytes.subarray(BEXT_LAYOUT.codingHistory.offset)),
  };
}
