import path from 'node:path';
import {
  applyDevice,
  encodeWavBlocks,
  openMemorySource,
  parseDevice,
  PRACTICE_DEVICES,
  type WavFile,
} from '@benchlark/dsp';
import { CliError, EXIT, type CliIo } from './cli-io';
import { namingFile } from './name-failure';
import { withWav } from './open-capture';
import { parseCommand, readText } from './parse-command';
import { readJson } from './read-json';
import { writeHashed } from './stimulus-command';

/** `practice IN.wav OUT.wav --device FILE.json|NAME`: passes a recording through a practice device. */
export async function runPractice(args: readonly string[], io: CliIo): Promise<void> {
  const command = parseCommand(args, { device: { type: 'string' } });
  const [from, to, surplus] = command.positionals;
  const deviceName = readText(command, 'device');
  if (from === undefined || to === undefined || surplus !== undefined || deviceName === undefined) {
    throw new CliError(EXIT.wrongUsage, 'practice takes IN.wav OUT.wav --device FILE.json or a name');
  }
  const built = PRACTICE_DEVICES[deviceName];
  if (!built && !deviceName.endsWith('.json')) {
    const names = Object.keys(PRACTICE_DEVICES).join(', ');
    throw new CliError(
      EXIT.wrongUsage,
      `there is no practice device "${deviceName}"; there are ${names}, or a .json file`,
    );
  }
  const fromFile = path.resolve(io.cwd, from);
  const toFile = path.resolve(io.cwd, to);
  if (fromFile === toFile) {
    throw new CliError(EXIT.wrongUsage, 'OUT.wav must be another file: a recording is never written over');
  }
  const device =
    built ??
    (await namingFile(deviceName, async () =>
      parseDevice(await readJson(path.resolve(io.cwd, deviceName), deviceName)),
    ));
  const pass = async (wav: WavFile) => ({
    channels: applyDevice(await wav.read(0, wav.frameCount), wav.sampleRateHz, device),
    sampleRateHz: wav.sampleRateHz,
    format: wav.format,
  });
  const { channels, sampleRateHz, format } = await namingFile(from, () => withWav(fromFile, pass));
  const bits = format.sampleFormat === 'float' ? '32f' : format.bitsPerSample <= 16 ? 16 : 24;
  await namingFile(to, () =>
    writeHashed(
      toFile,
      encodeWavBlocks(openMemorySource(channels, sampleRateHz), {
        bits,
        // A device that ends in its own quantiser must reach the file bit by bit.
        dither: bits === '32f' || device.stages.some(({ kind }) => kind === 'quantise') ? 'none' : 'tpdf',
        seed: device.seed,
      }),
    ),
  );
  io.out(`${to} written: ${from} through "${device.name}"\n`);
}
