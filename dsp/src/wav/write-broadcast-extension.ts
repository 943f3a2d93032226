import { DspInputError } from '../errors.js';
import {
  BEXT_FIXED_BYTES,
  BEXT_LAYOUT,
  type BroadcastExtension,
  type BroadcastLoudness,
  LOUDNESS_NOT_GIVEN,
} from './broadcast-extension.js';
import { putText, viewOf } from './little-endian.js';

/** What a writer is told; what is left out stays empty. There is no clock here: date and time come from the caller. */
export type BroadcastExtensionInput = Partial<Omit<BroadcastExtension, 'version' | 'timeReferenceFrames'>> & {
  readonly timeReferenceFrames?: number;
};

function checkShape(name: string, text: string, shape: RegExp, example: string): void {
  if (text !== '' && !shape.test(text)) {
    throw new DspInputError('BAD_ARGUMENT', `${name} must look like ${example}, not "${text}"`);
  }
}

/** The field is ASCII: other letters become a question mark, what is too long is cut. */
const asciiOf = (text: string, length: number): string => text.replace(/[^ -~\r\n]/gu, '?').slice(0, length);

function writeLoudness(view: DataView, loudness: BroadcastLoudness): void {
  const figures = [
    loudness.integratedLufs,
    loudness.rangeLu,
    loudness.maxTruePeakDbtp,
    loudness.maxMomentaryLufs,
    loudness.maxShortTermLufs,
  ];
  figures.forEach((figure, index) => {
    // Tech 3285 gives -99.99 to 99.99 as the range; a figure beyond it, silence for one, isn't given.
    const isGiven = figure !== null && Math.abs(figure) <= 99.99;
    const hundredths = isGiven ? Math.round(figure * 100) : LOUDNESS_NOT_GIVEN;
    view.setInt16(BEXT_LAYOUT.loudness.offset + 2 * index, hundredths, true);
  });
}

/**
 * Writes the content of a `bext` chunk, of version 2 when loudness is given, else of version 1.
 *
 * @throws DspInputError `BAD_ARGUMENT` for a date that isn't yyyy-mm-dd, a time that isn't hh:mm:ss, an identifier
 *   that isn't 128 hex digits, or a time reference that is no whole number
 * @see EBU Tech 3285 v2, 2.3 and 2.4
 */
export function writeBroadcastExtension(input: BroadcastExtensionInput): Uint8Array {
  const { originationDate = '', originationTime = '', timeReferenceFrames = 0, umid, loudness } = input;
  checkShape('originationDate', originationDate, /^\d{4}-\d\d-\d\d$/, 'yyyy-mm-dd');
  checkShape('originationTime', originationTime, /^\d\d:\d\d:\d\d$/, 'hh:mm:ss');
  checkShape('umid', umid ?? '', /^[0-9a-f]{128}$/i, '128 hex digits');
  if (!Number.isSafeInteger(timeReferenceFrames) || timeReferenceFrames < 0) {
    throw new DspInputError('BAD_ARGUMENT', `timeReferenceFrames can't be ${timeReferenceFrames}`);
  }
  const history = asciiOf((input.codingHistory ?? '').replace(/\r?\n/g, '\r\n'), Infinity);
  const bytes = new Uint8Array(BEXT_FIXED_BYTES + history.length);
  const view = viewOf(bytes);
  const putField = ({ offset, length }: { offset: number; length: number }, text: string): void =>
    putText(bytes, offset, asciiOf(text, length));
  putField(BEXT_LAYOUT.description, input.description ?? '');
  putField(BEXT_LAYOUT.originator, input.originator ?? '');
  putField(BEXT_LAYOUT.originatorReference, input.originatorReference ?? '');
  putField(BEXT_LAYOUT.originationDate, originationDate);
  putField(BEXT_LAYOUT.originationTime, originationTime);
  view.setBigUint64(BEXT_LAYOUT.timeReference.offset, BigInt(timeReferenceFrames), true);
  view.setUint16(BEXT_LAYOUT.version.offset, loudness ? 2 : 1, true);
  for (let n = 0; umid && n < BEXT_LAYOUT.umid.length; n++) {
    bytes[BEXT_LAYOUT.umid.offset + n] = Number.parseInt(umid.slice(2 * n, 2 * n + 2), 16);
  }
  if (loudness) {
    writeLoudness(view, loudness);
  }
  putText(bytes, BEXT_LAYOUT.codingHistory.offset, history);
  return bytes;
}
