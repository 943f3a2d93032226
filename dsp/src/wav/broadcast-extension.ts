/**
 * The `bext` chunk: where a recording comes from. Texts are ASCII.
 *
 * @see EBU Tech 3285, "Specification of the Broadcast Wave Format", version 2 (2011)
 */
export interface BroadcastExtension {
  /** At most 256 letters. */
  readonly description: string;
  /** At most 32 letters. */
  readonly originator: string;
  /** At most 32 letters. */
  readonly originatorReference: string;
  /** yyyy-mm-dd, or empty. */
  readonly originationDate: string;
  /** hh:mm:ss, or empty. */
  readonly originationTime: string;
  /** The first frame's time since midnight, counted in frames; null when it is beyond 2^53. */
  readonly timeReferenceFrames: number | null;
  /** Of the specification; loudness stands in 2 and later. */
  readonly version: number;
  /** SMPTE ST 330 identifier as 128 hex digits; null when there is none. */
  readonly umid: string | null;
  readonly loudness: BroadcastLoudness | null;
  /** Lines apart from each other by `\n`. */
  readonly codingHistory: string;
}

/** Each null where the chunk leaves it open. Kept in hundredths in the file. */
export interface BroadcastLoudness {
  readonly integratedLufs: number | null;
  readonly rangeLu: number | null;
  readonly maxTruePeakDbtp: number | null;
  readonly maxMomentaryLufs: number | null;
  readonly maxShortTermLufs: number | null;
}

/** Where each field begins in the chunk's content, and how long the texts are (Tech 3285, 2.3: sums of the sizes). */
export const BEXT_LAYOUT = {
  description: { offset: 0, length: 256 },
  originator: { offset: 256, length: 32 },
  originatorReference: { offset: 288, length: 32 },
  originationDate: { offset: 320, length: 10 },
  originationTime: { offset: 330, length: 8 },
  timeReference: { offset: 338 },
  version: { offset: 346 },
  umid: { offset: 348, length: 64 },
  loudness: { offset: 412 },
  codingHistory: { offset: 602 },
} as const;

/** The content without the coding history: 190 bytes of loudness and reserve end it. */
export const BEXT_FIXED_BYTES = 602;

/** Says "not given" where a loudness figure would stand (Tech 3285, 2.4). */
export const LOUDNESS_NOT_GIVEN = 0x7fff;
