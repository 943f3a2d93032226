import path from 'node:path';
import { captureFactsOf, inspectWav, roundNumbers } from '@benchlark/dsp';
import { hashFile } from '../files/hash-file';
import { CliError, EXIT, type CliIo, type ExitCode } from './cli-io';
import { describeFailure } from './describe-failure';
import { withWav } from './open-capture';
import { parseCommand } from './parse-command';
import { createProgressLine } from './progress-line';

async function inspectFile(shownName: string, io: CliIo) {
  const file = path.resolve(io.cwd, shownName);
  const progress = createProgressLine(io, `${shownName}: reading`);
  try {
    return await withWav(file, async (wav) => {
      const { peakFs, warnings } = await inspectWav(wav, { onProgress: progress.show });
      return roundNumbers({ capture: { ...captureFactsOf(wav, await hashFile(file)), peakFs }, warnings });
    });
  } finally {
    progress.clear();
  }
}

type Inspection = Awaited<ReturnType<typeof inspectFile>>;

function describeInspection(shownName: string, { capture, warnings }: Inspection): string {
  const peaks = capture.peakFs.map((peak) =>
    peak > 0 ? `${(20 * Math.log10(peak)).toFixed(2)} dBFS` : 'silent',
  );
  return [
    `${shownName}: ${capture.sampleRateHz} Hz, ${capture.channelCount} ch, ${capture.bitsPerSample} bit ${capture.sampleFormat}, ${capture.durationS.toFixed(3)} s, sample peak ${peaks.join(', ')}`,
    ...warnings.map(({ message }) => `  ${message}`),
  ].join('\n');
}

/** `inspect FILE.wav...`: says what each file is, reading every sample; goes on after a bad one. */
export async function runInspect(args: readonly string[], io: CliIo): Promise<void | ExitCode> {
  const { positionals, values } = parseCommand(args, { json: { type: 'boolean' } });
  if (positionals.length === 0) throw new CliError(EXIT.wrongUsage, 'the WAV files to inspect are missing');
  let hasFailed = false;
  for (const shownName of positionals) {
    try {
      const inspection = await inspectFile(shownName, io);
      const line = values['json']
        ? JSON.stringify({ file: shownName, ...inspection })
        : describeInspection(shownName, inspection);
      io.out(`${line}\n`);
    } catch (error) {
      const failure = describeFailure(error);
      if (!failure) throw error;
      hasFailed = true;
      const { code, message, offset } = failure;
      if (values['json'])
        io.out(`${JSON.stringify({ file: shownName, error: { code, message, offset } })}\n`);
      else io.err(`benchlark: ${shownName}: ${message}\n`);
    }
  }
  return hasFailed ? EXIT.unreadable : EXIT.done;
}
