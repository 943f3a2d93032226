import type { Capture } from '@/lib/api-schema';
import { measureTitle, toneWords, unitName } from '@/lib/capture-words';
import { formatDuration, formatFrequency } from '@/lib/format/quantity';
import type { ServedRecord } from '../api/record-queries';

const RECOGNISED_WORDS: Readonly<Record<string, string>> = {
  marks: 'by the marks in the file',
  descriptor: 'by the descriptor beside the file',
  signal: 'by the signal itself',
};

/** One line under an exported chart: what, of which unit, in which state, how. */
export function conditionsLine(capture: Capture, record: ServedRecord): string {
  const { settings } = record;
  const parts = [
    capture.unit ? unitName(capture.unit) : capture.fileName,
    capture.condition?.name,
    capture.rig?.name,
    capture.record ? toneWords(capture.record) : null,
    `${formatFrequency(settings.bandLowHz)} to ${formatFrequency(settings.bandHighHz)}`,
    `${formatDuration(settings.toS - settings.fromS)} measured`,
  ];
  return parts.filter(Boolean).join(', ');
}

/** What the recording was taken for, and by what it was known. */
export function recognisedWords(record: ServedRecord): string {
  const title = measureTitle(record.measure);
  if (!record.stimulus) return `${title}, as asked`;
  const by = RECOGNISED_WORDS[record.stimulus.recognisedBy] ?? record.stimulus.recognisedBy;
  return `${record.stimulus.name}, ${by}`;
}
