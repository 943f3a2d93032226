/** The part of wav-decoder 1.3.0 that the tests use; the package has no types of its own. */
declare module 'wav-decoder' {
  interface DecodedWav {
    sampleRate: number;
    numberOfChannels: number;
    length: number;
    channelData: Float32Array[];
  }
  const wavDecoder: {
    decode: { sync(bytes: ArrayBuffer, options: { symmetric: boolean }): DecodedWav };
  };
  export default wavDecoder;
}
