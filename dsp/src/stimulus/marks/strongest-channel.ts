import type { SampleSource } from '../../source/sample-source.js';

const PROBES = 16;
const PROBE_FRAMES = 4096;

/**
 * Finds the channel that carries most, from short runs spread over the recording; a constant part doesn't count.
 *
 * @returns its index; 0 when all are silent
 */
export async function findStrongestChannel(source: SampleSource): Promise<number> {
  if (source.channelCount === 1) return 0;
  const energies = new Float64Array(source.channelCount);
  const last = Math.max(0, source.frameCount - PROBE_FRAMES);
  for (let probe = 0; probe < PROBES; probe++) {
    const channels = await source.read(Math.floor((last * probe) / (PROBES - 1)), PROBE_FRAMES);
    channels.forEach((samples, index) => {
      const mean = samples.reduce((sum, x) => sum + x, 0) / Math.max(1, samples.length);
      energies[index] += samples.reduce((sum, x) => sum + (x - mean) ** 2, 0);
    });
  }
  return energies.indexOf(Math.max(...energies));
}
