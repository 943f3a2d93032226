import type { Capture } from '@/lib/api-schema';
import { measureTitle, toneWords, unitName } from '@/lib/capture-words';
import { formatDuration, formatFrequency } from '@/lib/format/quantity';
import type { ServedBody } from '../api/record-queries';

const RECOGNISED_WORDS: Readonly<Record<string, string>> = {
  marks: 'by the marks in the file',
  descriptor: 'by the descriptor beside the file',
  signal: 'by the signal itself',
};

/** One line under an exported chart: what, of which unit, in which state, how. */
export function conditionsLine(
  capture: Pick<Capture, 'fileName' | 'unit' | 'condition' | 'rig'>,
  body: ServedBody,
): string {
  const { settings } = body;
  const parts = [
    capture.unit ? unitName(capture.unit) : capture.fileName,
    capture.condition?.name,
    capture.rig?.name,
    toneWords(toneOf(body)) ?? measureTitle(body.measure),
    `${formatFrequency(settings.bandLowHz)} to ${formatFrequency(settings.bandHighHz)}`,
    `${formatDuration(settings.toS - settings.fromS)} measured`,
  ];
  return parts.filter(Boolean).join(', ');
}

/** The tone of a body's first channel, where it has one. */
export function toneOf({ channels }: Pick<ServedBody, 'channels'>) {
  const figures = channels[0]?.figures ?? {};
  const numberOrNull = (key: string) => {
    const value = figures[key];
    return typeof value === 'number' ? value : null;
  };
  return {
    fundamentalFrequencyHz: numberOrNull('fundamentalFrequencyHz'),
    fundamentalLevelDbfs: numberOrNull('fundamentalLevelDbfs'),
  };
}

/** What the recording was taken for, and by what it was known. */
export function recognisedWords(record: ServedBody): string {
  const title = measureTitle(record.measure);
  if (!record.stimulus) return `${title}, as asked`;
  const by = RECOGNISED_WORDS[record.stimulus.recognisedBy] ?? record.stimulus.recognisedBy;
  return `${record.stimulus.name}, ${by}`;
}
