/**
 * W3C MediaStreamTrack Insertable Media Processing, as browsers have it for sound on a page; TypeScript's libraries know
 * it of pictures in a worker alone.
 */
type TrackProcessor = new (init: { track: MediaStreamTrack; maxBufferSize: number }) => {
  readonly readable: ReadableStream<AudioData>;
};

/** Blocks of about 10 ms: half a minute. A browser's own default is so short that some are lost while the worker measures. */
const MOST_BLOCKS = 3000;

/** A track's samples as they come; null in a browser that can't read tracks. */
export function readerOf(track: MediaStreamTrack): ReadableStream<AudioData> | null {
  const Processor = (globalThis as { MediaStreamTrackProcessor?: unknown }).MediaStreamTrackProcessor;
  if (typeof Processor !== 'function') return null;
  return new (Processor as TrackProcessor)({ track, maxBufferSize: MOST_BLOCKS }).readable;
}
