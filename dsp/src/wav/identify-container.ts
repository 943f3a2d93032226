import { fourLetters } from './little-endian.js';

/** A file that isn't WAV, named by the bytes it begins with. */
export interface OtherContainer {
  readonly name: string;
  readonly remedy: string;
}

const LOSSLESS =
  'Export it as WAV (PCM or float) without changing rate, level or bit depth, and use that file.';
const LOSSY = 'What the coder took away can not be measured any more: record again as WAV (PCM or float).';
const ARCHIVE = 'Unpack it and use the WAV file inside.';
const NO_SOUND = 'Choose the recording itself: a WAV file (PCM or float).';

interface Magic {
  /** Text at an offset; `\x..` stands for any byte value. All pieces must be there. */
  readonly pieces: readonly (readonly [offset: number, text: string])[];
  readonly name: string;
  readonly remedy: string;
}

const magic = (name: string, remedy: string, ...pieces: Magic['pieces']): Magic => ({ name, remedy, pieces });

// Each format's own specification gives its first bytes; those of the sound formats are from memory of them.
const MAGICS: readonly Magic[] = [
  magic('Wave64 (.w64)', LOSSLESS, [0, 'riff\x2e\x91\xcf\x11\xa5\xd6\x28\xdb']),
  magic('big-endian RIFX', LOSSLESS, [0, 'RIFX']),
  magic('AVI video', LOSSLESS, [0, 'RIFF'], [8, 'AVI ']),
  magic('WebP picture', NO_SOUND, [0, 'RIFF'], [8, 'WEBP']),
  magic('RIFF MIDI', NO_SOUND, [0, 'RIFF'], [8, 'RMID']),
  magic('AIFF', LOSSLESS, [0, 'FORM'], [8, 'AIFF']),
  magic('AIFF-C', LOSSLESS, [0, 'FORM'], [8, 'AIFC']),
  magic('FLAC', LOSSLESS, [0, 'fLaC']),
  magic('Core Audio Format', LOSSLESS, [0, 'caff']),
  magic('AU', LOSSLESS, [0, '.snd']),
  magic('WavPack', LOSSLESS, [0, 'wvpk']),
  magic("Monkey's Audio", LOSSLESS, [0, 'MAC ']),
  magic('DSD (.dsf)', 'Convert it to WAV of a high rate: DSD itself can not be measured here.', [0, 'DSD ']),
  magic('DSD (.dff)', 'Convert it to WAV of a high rate: DSD itself can not be measured here.', [0, 'FRM8']),
  magic('Ogg', LOSSY, [0, 'OggS']),
  magic('MP3 with an ID3 tag', LOSSY, [0, 'ID3']),
  magic('MP4 (.m4a, .mov)', LOSSY, [4, 'ftyp']),
  magic('Matroska or WebM', LOSSY, [0, '\x1a\x45\xdf\xa3']),
  magic('ASF (.wma)', LOSSY, [0, '\x30\x26\xb2\x75\x8e\x66\xcf\x11']),
  magic('AMR speech', LOSSY, [0, '#!AMR']),
  magic('MIDI', NO_SOUND, [0, 'MThd']),
  magic('gzip', ARCHIVE, [0, '\x1f\x8b']),
  magic('zip', ARCHIVE, [0, 'PK\x03\x04']),
  magic('7z', ARCHIVE, [0, '7z\xbc\xaf\x27\x1c']),
  magic('xz', ARCHIVE, [0, '\xfd7zXZ\x00']),
  magic('RAR', ARCHIVE, [0, 'Rar!\x1a\x07']),
  magic('bzip2', ARCHIVE, [0, 'BZh']),
  magic('PDF', NO_SOUND, [0, '%PDF-']),
  magic('PNG picture', NO_SOUND, [0, '\x89PNG']),
  magic('JPEG picture', NO_SOUND, [0, '\xff\xd8\xff']),
  magic('GIF picture', NO_SOUND, [0, 'GIF8']),
  magic('HTML page', NO_SOUND, [0, '<!DOCTYPE']),
  magic('HTML page', NO_SOUND, [0, '<!doctype']),
  magic('HTML page', NO_SOUND, [0, '<html']),
  magic('XML document', NO_SOUND, [0, '<?xml']),
];

const holds = (head: Uint8Array, offset: number, text: string): boolean =>
  offset + text.length <= head.length &&
  Array.from(text).every((letter, n) => head[offset + n] === letter.charCodeAt(0));

/** An MPEG audio or AAC frame begins with 11 bits set (ISO/IEC 11172-3, 2.4.1.3), without reserved values after. */
function isMpegFrame(head: Uint8Array): boolean {
  const isSync = head.length >= 4 && head[0] === 0xff && (head[1] & 0xe0) === 0xe0;
  return isSync && (head[1] & 0x18) !== 0x08 && (head[2] & 0xf0) !== 0xf0;
}

/**
 * Names the container of a file that isn't RIFF WAVE, from its first bytes.
 *
 * @param head - the first bytes of the file, 12 or more where it has them
 * @returns its name and what to do, or null when it isn't one of those known
 */
export function identifyContainer(head: Uint8Array): OtherContainer | null {
  const known = MAGICS.find(({ pieces }) => pieces.every(([offset, text]) => holds(head, offset, text)));
  if (known !== undefined) {
    return { name: known.name, remedy: known.remedy };
  }
  if (fourLetters(head) === 'RIFF' && head.length >= 12) {
    return { name: `RIFF of the kind "${fourLetters(head, 8).replace(/[^ -~]/g, '?')}"`, remedy: LOSSLESS };
  }
  return isMpegFrame(head) ? { name: 'MPEG audio (MP3 or AAC)', remedy: LOSSY } : null;
}
