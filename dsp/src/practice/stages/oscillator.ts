/**
 * Makes a sine that starts at phase 0 and goes up.
 *
 * @returns sin(2π · frequency · frame / rate) of a frame, with whole turns taken off first: frame · whole hertz stays an
 *   exact integer, and only the fraction's product is rounded
 */
export function createSine(frequencyHz: number, sampleRateHz: number): (frame: number) => number {
  const wholeHz = Math.floor(frequencyHz);
  const restHz = frequencyHz - wholeHz;
  return (frame) => {
    const turns = ((frame * wholeHz) % sampleRateHz) / sampleRateHz + (frame * restHz) / sampleRateHz;
    return Math.sin(2 * Math.PI * (turns - Math.floor(turns)));
  };
}
