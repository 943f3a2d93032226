const SURROUND = 1.41;

/**
 * Weights of channels in the sum, by their usual order: left, right, centre, then low-frequency effects (six channels and
 * more), then surrounds; four are left, right and two surrounds.
 *
 * @see ITU-R BS.1770-5, Annex 1, Table 3
 */
export function channelGains(channelCount: number): number[] {
  if (channelCount === 4) return [1, 1, SURROUND, SURROUND];
  const hasEffects = channelCount >= 6;
  return Array.from({ length: channelCount }, (_, index) =>
    index < 3 ? 1 : hasEffects && index === 3 ? 0 : SURROUND,
  );
}
