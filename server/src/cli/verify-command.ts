import path from 'node:path';
import { analyseCapture, compareRecords, DSP_VERSION, parseRecord, toRecordJson } from '@benchlark/dsp';
import { hashFile } from '../files/hash-file';
import { CliError, EXIT, type CliIo } from './cli-io';
import { namingFile } from './name-failure';
import { withWav } from './open-capture';
import { parseCommand } from './parse-command';
import { readJson } from './read-json';

/** `verify RECORD.json FILE.wav`: computes the record again and names every figure that differs. */
export async function runVerify(args: readonly string[], io: CliIo): Promise<void> {
  const { positionals } = parseCommand(args, {});
  const [recordName, fileName, surplus] = positionals;
  if (recordName === undefined || fileName === undefined || surplus !== undefined) {
    throw new CliError(EXIT.wrongUsage, 'verify takes a record and a recording: verify RECORD.json FILE.wav');
  }
  const stored = await namingFile(recordName, async () =>
    parseRecord(await readJson(path.resolve(io.cwd, recordName), recordName)),
  );
  const file = path.resolve(io.cwd, fileName);
  const sha256 = await namingFile(fileName, () => hashFile(file));
  if (sha256 !== stored.capture.sha256) {
    throw new CliError(
      EXIT.disagrees,
      `${fileName}: its bytes are not those the record was made from (SHA-256 ${sha256}, the record says ${stored.capture.sha256})`,
    );
  }
  const { measure, settings } = stored;
  const { record } = await namingFile(fileName, () =>
    withWav(file, (wav) =>
      analyseCapture(wav, sha256, { measure, settings, descriptor: settings.descriptor }, {}),
    ),
  );
  const differences = compareRecords(stored, toRecordJson(record, { traces: 'none' }));
  if (stored.dspVersion !== DSP_VERSION) {
    io.err(`benchlark: ${recordName}: was made by dsp ${stored.dspVersion}, this is ${DSP_VERSION}\n`);
  }
  if (differences.length === 0) {
    io.out(`${recordName} agrees with ${fileName}\n`);
    return;
  }
  for (const { path: place, stored: was, computed } of differences) {
    io.out(
      `${place}: the record says ${JSON.stringify(was) ?? 'nothing'}, computed again ${JSON.stringify(computed) ?? 'nothing'}\n`,
    );
  }
  throw new CliError(EXIT.disagrees, `${recordName}: ${differences.length} places differ from ${fileName}`);
}
