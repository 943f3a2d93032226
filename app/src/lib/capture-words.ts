import type { MeasureId } from '@benchlark/dsp';
import type { Capture, RecordSummary, Role } from './api-schema';
import { formatFrequency, formatLevel } from './format/quantity';

const MEASURE_TITLES: Record<MeasureId, string> = {
  tone: 'tone',
  idle: 'idle',
  'dynamic-range': 'dynamic range',
  'two-tone': 'two tones',
  'two-tone-steps': 'two tones in steps',
  'level-steps': 'level steps',
  sweep: 'sweep',
  multitone: 'multitone',
  separation: 'separation',
  jitter: 'jitter test',
  intersample: 'intersample tone',
  filter: 'noise through the filter',
  loudness: 'loudness',
  programme: 'programme',
};

export function isMeasure(measure: string | null): measure is MeasureId {
  return measure !== null && Object.hasOwn(MEASURE_TITLES, measure);
}

/** The measures a person may ask for, in the order of a menu. */
export const MEASURE_CHOICES: readonly MeasureId[] = Object.keys(MEASURE_TITLES).filter(isMeasure);

export function measureTitle(measure: string): string {
  return isMeasure(measure) ? MEASURE_TITLES[measure] : measure.replaceAll('-', ' ');
}

export function unitName(unit: { maker: string; model: string; serialNumber: string | null }): string {
  const name = `${unit.maker} ${unit.model}`;
  return unit.serialNumber ? `${name}, no. ${unit.serialNumber}` : name;
}

/** What a record says was measured: a title, and the tone where there was one. */
export function whatWasMeasured(capture: Pick<Capture, 'record' | 'fileName'>): {
  title: string;
  detail: string;
} {
  const { record } = capture;
  if (!record) return { title: 'not analysed', detail: capture.fileName };
  return { title: measureTitle(record.measure), detail: toneWords(record) ?? capture.fileName };
}

/** "997 Hz at −1.0 dBFS", or null when the record has no tone. */
export function toneWords(
  record: Pick<RecordSummary, 'fundamentalFrequencyHz' | 'fundamentalLevelDbfs'>,
): string | null {
  if (record.fundamentalFrequencyHz === null) return null;
  const frequency = formatFrequency(record.fundamentalFrequencyHz, 0);
  if (record.fundamentalLevelDbfs === null) return frequency;
  return `${frequency} at ${formatLevel(record.fundamentalLevelDbfs)}`;
}

/** A title that tells captures apart: "Capture 2031: 997 Hz at −1.0 dBFS". */
export function captureTitle(capture: Capture): string {
  const { record } = capture;
  if (!record) return `Capture ${capture.number}: ${capture.fileName}`;
  const tone = record.measure === 'tone' ? toneWords(record) : null;
  return `Capture ${capture.number}: ${tone ?? measureTitle(record.measure)}`;
}

const CHANNEL_WORDS: Readonly<Record<string, string>> = { left: 'left', right: 'right' };

/** left, right, channel 3 … */
export function channelName(channel: string): string {
  return CHANNEL_WORDS[channel] ?? channel.replace(/^ch/, 'channel ');
}

export const STATE_WORDS: Record<Capture['state'], string> = {
  queued: 'waits for the analyser',
  analysing: 'being analysed',
  done: 'analysed',
  failed: 'analysis failed',
  cancelled: 'analysis cancelled',
};

export const ROLE_WORDS: Record<Role, string> = {
  technician: 'technician',
  reviewer: 'reviewer',
  peer: 'peer',
  administrator: 'administrator',
  reader: 'reader',
};

const SAMPLE_FORMAT_WORDS: Readonly<Record<string, string>> = { integer: '', float: ' float' };

/** "24 bit", "32 bit float". */
export function bitsWords(capture: Pick<Capture, 'bitsPerSample' | 'sampleFormat'>): string {
  return `${capture.bitsPerSample} bit${SAMPLE_FORMAT_WORDS[capture.sampleFormat] ?? ''}`;
}
