import path from 'node:path';
import {
  analyseCapture,
  MEASURE_IDS,
  parseCalibration,
  parseDescriptor,
  parseRecord,
  toRecordJson,
  type AnalysisSettings,
} from '@benchlark/dsp';
import { hashFile } from '../files/hash-file';
import type { CliIo } from './cli-io';
import { namingFile } from './name-failure';
import { withWav } from './open-capture';
import {
  parseCommand,
  readBand,
  readChoice,
  readNumber,
  readText,
  takeOne,
  type ParsedCommand,
} from './parse-command';
import { printRecord } from './print-record';
import { createProgressLine } from './progress-line';
import { readJson } from './read-json';

const OPTIONS = {
  measure: { type: 'string' },
  stimulus: { type: 'string' },
  band: { type: 'string' },
  from: { type: 'string' },
  to: { type: 'string' },
  channel: { type: 'string' },
  calibration: { type: 'string' },
  baseline: { type: 'string' },
  traces: { type: 'string' },
  json: { type: 'boolean' },
} as const;

/** Reads a JSON file named by an option through its parser; null when the option isn't given. */
async function readOption<T>(
  command: ParsedCommand,
  io: CliIo,
  name: string,
  parse: (json: unknown) => T,
): Promise<T | null> {
  const file = readText(command, name);
  if (file === undefined) return null;
  return namingFile(file, async () => parse(await readJson(path.resolve(io.cwd, file), file)));
}

export async function runAnalyse(args: readonly string[], io: CliIo): Promise<void> {
  const command = parseCommand(args, OPTIONS);
  const shownName = takeOne(command, 'the WAV file to analyse');
  const file = path.resolve(io.cwd, shownName);
  const settings: AnalysisSettings = {
    ...readBand(command),
    fromS: readNumber(command, 'from'),
    toS: readNumber(command, 'to'),
    channel: readChoice(command, 'channel', ['left', 'right', 'all']),
    calibration: await readOption(command, io, 'calibration', parseCalibration),
    baseline: await readOption(command, io, 'baseline', parseRecord),
  };
  const traces = readChoice(command, 'traces', ['none', 'reduced', 'full']) ?? 'reduced';
  const measure = readChoice(command, 'measure', MEASURE_IDS);
  const descriptor = await readOption(command, io, 'stimulus', parseDescriptor);
  const progress = createProgressLine(io, `${shownName}: analysing`);
  const { record, recognition } = await namingFile(shownName, () =>
    withWav(file, async (wav) =>
      analyseCapture(
        wav,
        await hashFile(file),
        { measure, settings, descriptor },
        { onProgress: progress.show },
      ),
    ),
  ).finally(progress.clear);
  if (command.values['json']) {
    io.out(`${JSON.stringify(toRecordJson(record, { traces }), null, 2)}\n`);
    return;
  }
  if (recognition) io.out(`Taken for  ${recognition.measure}: ${recognition.why}\n`);
  io.out(printRecord(record));
}
