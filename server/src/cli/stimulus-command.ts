import { createHash } from 'node:crypto';
import { createWriteStream } from 'node:fs';
import { rename, rm, writeFile } from 'node:fs/promises';
import path from 'node:path';
import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { createStimulus, encodeWavBlocks, type StimulusBits } from '@benchlark/dsp';
import { CliError, EXIT, type CliIo } from './cli-io';
import { namingFile } from './name-failure';
import { parseCommand, readChoice, readNumber, readText, takeOne } from './parse-command';

const OPTIONS = {
  rate: { type: 'string' },
  bits: { type: 'string' },
  frequency: { type: 'string' },
  low: { type: 'string' },
  high: { type: 'string' },
  level: { type: 'string' },
  ceiling: { type: 'string' },
  duration: { type: 'string' },
  channels: { type: 'string' },
  dither: { type: 'string' },
  seed: { type: 'string' },
  bare: { type: 'boolean' },
  quick: { type: 'boolean' },
  out: { type: 'string' },
} as const;

const BITS: Readonly<Record<string, StimulusBits>> = { '16': 16, '24': 24, '32f': '32f' };

/** Writes bytes under another name first, so that a cut-off run leaves no half file under the wanted one. */
export async function writeHashed(file: string, blocks: AsyncIterable<Uint8Array>): Promise<string> {
  const part = `${file}.part`;
  const hash = createHash('sha256');
  try {
    await pipeline(
      Readable.from(blocks),
      async function* (source: AsyncIterable<Uint8Array>) {
        for await (const block of source) {
          hash.update(block);
          yield block;
        }
      },
      createWriteStream(part),
    );
    await rename(part, file);
  } catch (error) {
    await rm(part, { force: true });
    throw error;
  }
  return hash.digest('hex');
}

/** `stimulus NAME --rate HZ --bits 16|24|32f --out FILE.wav`: writes the file and its descriptor beside it. */
export async function runStimulus(args: readonly string[], io: CliIo): Promise<void> {
  const command = parseCommand(args, OPTIONS);
  const name = takeOne(command, 'the name of the stimulus');
  const out = readText(command, 'out');
  if (out === undefined || !out.endsWith('.wav')) {
    throw new CliError(EXIT.wrongUsage, '--out takes the WAV file to write, ending in .wav');
  }
  const bits = BITS[readChoice(command, 'bits', ['16', '24', '32f']) ?? '24'] ?? 24;
  const sampleRateHz = readNumber(command, 'rate');
  if (sampleRateHz === undefined)
    throw new CliError(EXIT.wrongUsage, '--rate is missing: the sample rate in Hz');
  const stimulus = createStimulus(name, {
    sampleRateHz,
    bitsPerSample: bits,
    frequencyHz: readNumber(command, 'frequency'),
    lowFrequencyHz: readNumber(command, 'low'),
    highFrequencyHz: readNumber(command, 'high'),
    levelDbfs: readNumber(command, 'level'),
    ceilingDbfs: readNumber(command, 'ceiling'),
    durationS: readNumber(command, 'duration'),
    channels: readChoice(command, 'channels', ['both', 'left', 'right']),
    dither: readChoice(command, 'dither', ['tpdf', 'none']),
    seed: readNumber(command, 'seed'),
    isBare: command.values['bare'] === true,
    isQuick: command.values['quick'] === true,
  });
  const file = path.resolve(io.cwd, out);
  const descriptorFile = file.replace(/\.wav$/, '.json');
  await namingFile(out, async () => {
    const sha256 = await writeHashed(file, encodeWavBlocks(stimulus.source, stimulus.encoding));
    await writeFile(descriptorFile, `${JSON.stringify(stimulus.describe(sha256), null, 2)}\n`);
  });
  io.out(`${out} and ${path.basename(descriptorFile)} written\n`);
  io.err(
    'Before you play it: disconnect loudspeakers and headphones, start with the volume down. A test tone can destroy tweeters and hearing.\n',
  );
}
