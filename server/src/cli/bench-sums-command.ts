import path from 'node:path';
import {
  outputImpedance,
  outputPower,
  parseCalibration,
  parseRecord,
  riaaDeviation,
  roundNumbers,
  type BenchRecord,
  type ChannelImpedance,
  type ChannelPower,
  type RiaaDeviation,
} from '@benchlark/dsp';
import { CliError, EXIT, type CliIo } from './cli-io';
import { namingFile } from './name-failure';
import { parseCommand, readNumber, readText, takeOne, type ParsedCommand } from './parse-command';
import { readJson } from './read-json';

const readRecord = (name: string, io: CliIo): Promise<BenchRecord> =>
  namingFile(name, async () => parseRecord(await readJson(path.resolve(io.cwd, name), name)));

function needNumber(command: ParsedCommand, name: string): number {
  const value = readNumber(command, name);
  if (value === undefined) throw new CliError(EXIT.wrongUsage, `--${name} is missing`);
  return value;
}

function print<Entry>(
  io: CliIo,
  command: ParsedCommand,
  entries: readonly Entry[],
  line: (entry: Entry) => string,
) {
  if (command.values['json']) io.out(`${JSON.stringify(roundNumbers(entries))}\n`);
  else entries.forEach((entry) => io.out(`${line(entry)}\n`));
}

/** `power STEPS.json --calibration FILE.json --load OHM`: watts at 0.1 and 1 % from a record of level steps. */
export async function runPower(args: readonly string[], io: CliIo): Promise<void> {
  const command = parseCommand(args, {
    calibration: { type: 'string' },
    load: { type: 'string' },
    'input-volts': { type: 'string' },
    json: { type: 'boolean' },
  });
  const name = takeOne(command, 'the record of level steps');
  const calibrationName = readText(command, 'calibration');
  if (calibrationName === undefined) throw new CliError(EXIT.wrongUsage, '--calibration is missing');
  const loadOhm = needNumber(command, 'load');
  const record = await readRecord(name, io);
  const calibration = await namingFile(calibrationName, async () =>
    parseCalibration(await readJson(path.resolve(io.cwd, calibrationName), calibrationName)),
  );
  const inputFullScaleVrms = readNumber(command, 'input-volts') ?? null;
  print(io, command, outputPower(record, { loadOhm, calibration, inputFullScaleVrms }), powerLine);
}

const LIMIT_WORDS = {
  'never-reached': 'never reached',
  'exceeded-throughout': 'exceeded at every step',
} as const;

function powerLine({ channel, atLimits, gainDb }: ChannelPower): string {
  const limits = atLimits.map(({ thdPlusNoisePercent, powerW, lowW, highW, why }) =>
    powerW === null || lowW === null || highW === null
      ? `${thdPlusNoisePercent} % THD+N ${why === null ? 'not told' : LIMIT_WORDS[why]}`
      : `${powerW.toPrecision(3)} W at ${thdPlusNoisePercent} % THD+N (steps at ${lowW.toPrecision(3)} and ${highW.toPrecision(3)} W)`,
  );
  return [channel, ...limits, ...(gainDb === null ? [] : [`gain ${gainDb.toFixed(2)} dB`])].join(', ');
}

/** `impedance UNLOADED.json LOADED.json --load OHM`: output impedance and damping factor from two takes of a tone. */
export async function runImpedance(args: readonly string[], io: CliIo): Promise<void> {
  const command = parseCommand(args, {
    load: { type: 'string' },
    uncertainty: { type: 'string' },
    json: { type: 'boolean' },
  });
  const [unloadedName, loadedName, surplus] = command.positionals;
  if (unloadedName === undefined || loadedName === undefined || surplus !== undefined) {
    throw new CliError(EXIT.wrongUsage, 'impedance takes two records: impedance UNLOADED.json LOADED.json');
  }
  const standardUncertaintyDb = readNumber(command, 'uncertainty');
  const found = outputImpedance(await readRecord(unloadedName, io), await readRecord(loadedName, io), {
    loadOhm: needNumber(command, 'load'),
    ...(standardUncertaintyDb === undefined ? {} : { standardUncertaintyDb }),
  });
  print(io, command, found, impedanceLine);
}

function impedanceLine(found: ChannelImpedance): string {
  const { channel, frequencyHz, levelDropDb, outputImpedanceOhm, dampingFactor } = found;
  const head = `${channel}: at ${frequencyHz.toFixed(0)} Hz the load takes ${levelDropDb.toFixed(4)} dB`;
  if (outputImpedanceOhm === null || dampingFactor === null) {
    return `${head}: below ${(found.belowOhm ?? 0).toPrecision(2)} ohm, no more can be told`;
  }
  const plusMinus = found.expandedUncertaintyOhm.toPrecision(1);
  return `${head}: ${outputImpedanceOhm.toPrecision(3)} ohm (± ${plusMinus}, k = 2), damping factor ${dampingFactor.toPrecision(3)}`;
}

/** `phono SWEEP.json`: deviation from the replay curve of records. */
export async function runPhono(args: readonly string[], io: CliIo): Promise<void> {
  const command = parseCommand(args, {
    amendment: { type: 'boolean' },
    recorded: { type: 'boolean' },
    json: { type: 'boolean' },
  });
  const record = await readRecord(takeOne(command, 'the record of a sweep'), io);
  const found = riaaDeviation(record, {
    hasAmendment: command.values['amendment'] === true,
    fed: command.values['recorded'] === true ? 'recording-curve' : 'flat',
  });
  print(io, command, found, phonoLine);
}

function phonoLine({ channel, greatestDb, greatestAtHz }: RiaaDeviation): string {
  return `${channel}: ${greatestDb >= 0 ? '+' : ''}${greatestDb.toFixed(2)} dB from the replay curve at ${greatestAtHz.toFixed(0)} Hz, the most from 20 Hz to 20 kHz`;
}
