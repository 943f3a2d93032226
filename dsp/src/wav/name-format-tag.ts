export const FORMAT_TAG_PCM = 1;
export const FORMAT_TAG_FLOAT = 3;
export const FORMAT_TAG_EXTENSIBLE = 0xfffe;

// Registered wave formats: RFC 2361 and Microsoft's mmreg.h.
const NAMES: Readonly<Record<number, string>> = {
  0x0000: 'no format',
  0x0002: 'Microsoft ADPCM',
  0x0006: 'A-law',
  0x0007: 'mu-law',
  0x0008: 'DTS',
  0x0010: 'OKI ADPCM',
  0x0011: 'IMA ADPCM',
  0x0014: 'G.723 ADPCM',
  0x0020: 'Yamaha ADPCM',
  0x0022: 'TrueSpeech',
  0x0031: 'GSM 6.10',
  0x0040: 'G.721 ADPCM',
  0x0045: 'G.726 ADPCM',
  0x0050: 'MPEG layer 1 or 2',
  0x0055: 'MP3',
  0x0064: 'G.726 ADPCM',
  0x0065: 'G.722 ADPCM',
  0x0092: 'AC-3 over S/PDIF',
  0x00ff: 'AAC',
  0x0160: 'Windows Media Audio',
  0x0161: 'Windows Media Audio',
  0x0162: 'Windows Media Audio Professional',
  0x0163: 'Windows Media Audio Lossless',
  0x1600: 'AAC in ADTS',
  0x1610: 'AAC (HE-AAC)',
  0x2000: 'AC-3',
  0x2001: 'DTS',
  0x674f: 'Ogg Vorbis',
  0xf1ac: 'FLAC',
};

/** Names a format tag for people, with its number: `A-law (0x0006)`. */
export function nameFormatTag(tag: number): string {
  const number = `0x${tag.toString(16).padStart(4, '0')}`;
  return tag in NAMES ? `${NAMES[tag]} (${number})` : `a format unknown here (${number})`;
}
