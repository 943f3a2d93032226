export interface WavRecipe {
  readonly sampleRateHz?: number;
  readonly channelCount?: number;
  readonly durationS?: number;
  readonly frequencyHz?: number;
  /** Linear peak. */
  readonly peak?: number;
  /** Makes otherwise equal files differ. */
  readonly seed?: number;
}

/** A 16-bit PCM file with a tone and a little noise, written byte by byte after the RIFF definition. */
export function wavBytes(recipe: WavRecipe = {}): Buffer {
  const {
    sampleRateHz = 48_000,
    channelCount = 2,
    durationS = 0.5,
    frequencyHz = 997,
    peak = 0.5,
    seed = 1,
  } = recipe;
  const frameCount = Math.round(sampleRateHz * durationS);
  const blockAlign = channelCount * 2;
  const bytes = Buffer.alloc(44 + frameCount * blockAlign);
  bytes.write('RIFF', 0, 'latin1');
  bytes.writeUInt32LE(bytes.length - 8, 4);
  bytes.write('WAVEfmt ', 8, 'latin1');
  bytes.writeUInt32LE(16, 16);
  bytes.writeUInt16LE(1, 20);
  bytes.writeUInt16LE(channelCount, 22);
  bytes.writeUInt32LE(sampleRateHz, 24);
  bytes.writeUInt32LE(sampleRateHz * blockAlign, 28);
  bytes.writeUInt16LE(blockAlign, 32);
  bytes.writeUInt16LE(16, 34);
  bytes.write('data', 36, 'latin1');
  bytes.writeUInt32LE(frameCount * blockAlign, 40);
  let state = seed;
  for (let frame = 0; frame < frameCount; frame++) {
    const tone = peak * Math.sin((2 * Math.PI * frequencyHz * frame) / sampleRateHz);
    for (let channel = 0; channel < channelCount; channel++) {
      state = (Math.imul(state, 1_664_525) + 1_013_904_223) >>> 0; // Numerical Recipes' generator
      const noise = state / 2 ** 32 - 0.5;
      bytes.writeInt16LE(Math.round(tone * 32_767 + noise), 44 + frame * blockAlign + channel * 2);
    }
  }
  return bytes;
}

/** A 32-bit float file with one sample that is no number, far inside. */
export function wavWithNaN(frameCount = 30_000, atFrame = 20_000): Buffer {
  const bytes = Buffer.alloc(44 + frameCount * 4);
  wavBytes({ channelCount: 1, durationS: 0.01 }).copy(bytes, 0, 0, 44);
  bytes.writeUInt32LE(bytes.length - 8, 4);
  bytes.writeUInt16LE(3, 20);
  bytes.writeUInt16LE(1, 22);
  bytes.writeUInt32LE(48_000 * 4, 28);
  bytes.writeUInt16LE(4, 32);
  bytes.writeUInt16LE(32, 34);
  bytes.writeUInt32LE(frameCount * 4, 40);
  for (let frame = 0; frame < frameCount; frame++) {
    bytes.writeFloatLE(0.5 * Math.sin((2 * Math.PI * 997 * frame) / 48_000), 44 + frame * 4);
  }
  bytes.writeFloatLE(NaN, 44 + atFrame * 4);
  return bytes;
}
