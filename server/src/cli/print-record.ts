import type { BenchRecord, ChannelResult, FigureLimit } from '@benchlark/dsp';
import { unitWord } from '../records/unit-word';
import { figureLabel, figureText, numberText } from './figure-words';

/** Puts decimal points under each other whatever the length of the numbers. */
function alignPoints(values: readonly string[]): string[] {
  const whole = (value: string): number => (value.includes('.') ? value.indexOf('.') : value.length);
  const before = Math.max(...values.map(whole));
  const padded = values.map((value) => value.padStart(value.length + before - whole(value)));
  const width = Math.max(...padded.map((value) => value.length));
  return padded.map((value) => value.padEnd(width));
}

function marginText(marginDb: number): string {
  if (Math.abs(marginDb) < 0.05) return 'at it';
  return `${Math.abs(marginDb).toFixed(1)} dB ${marginDb > 0 ? 'above' : 'below'} it`;
}

function worthText(key: string, limit: FigureLimit | undefined): string {
  if (!limit) return '';
  const margin = limit.marginDb === null ? '' : `, ${marginText(limit.marginDb)}`;
  const bound = limit.below === null ? '' : `at most ${numberText(key, limit.below)}, `;
  return `${bound}limited by ${limit.by}${margin}`;
}

/** Lays rows out in columns; the first is left-aligned, the last not padded. */
function layOut(rows: readonly (readonly string[])[]): string[] {
  const columns = Math.max(...rows.map((row) => row.length));
  const widths = Array.from({ length: columns }, (_, index) =>
    Math.max(...rows.map((row) => (row[index] ?? '').length)),
  );
  return rows.map((row) =>
    widths
      .map((width, index) => (row[index] ?? '').padEnd(width))
      .join('  ')
      .trimEnd(),
  );
}

function figureLines(channel: ChannelResult): string[] {
  const keys = Object.keys(channel.figures);
  const texts = keys.map((key) => figureText(key, channel.figures[key], channel.uncertainty[key]));
  const values = alignPoints(texts.map(({ value }) => value));
  const expanded = alignPoints(texts.map((text) => text.expanded));
  return layOut(
    keys.map((key, index) => [
      `  ${figureLabel(key)}`,
      values[index] ?? '',
      expanded[index] ?? '',
      unitWord(key),
      worthText(key, channel.limits[key]),
    ]),
  );
}

function harmonicLines(channel: ChannelResult): string[] {
  if (channel.harmonics.length === 0) return [];
  const levels = alignPoints(channel.harmonics.map(({ levelDbr }) => levelDbr?.toFixed(2) ?? '-'));
  const rows = channel.harmonics.map((harmonic, index) => [
    `  Harmonic ${harmonic.order}`,
    `${harmonic.frequencyHz.toFixed(1)} Hz`.padStart(12),
    `${levels[index] ?? ''} dBr`,
    harmonic.phaseDeg === null ? '' : `${harmonic.phaseDeg.toFixed(0)}°`,
  ]);
  return layOut(rows);
}

function componentLines(channel: ChannelResult): string[] {
  return layOut(
    channel.components.map((component) => [
      '  Line',
      ...Object.entries(component).map(([key, value]) =>
        typeof value === 'number' ? `${value.toFixed(2)} ${unitWord(key)}` : String(value ?? '-'),
      ),
    ]),
  );
}

/** Writes a record as a person reads it: what was measured and how, each channel's figures, what to heed. */
export function printRecord(record: BenchRecord): string {
  const { capture, settings, stimulus } = record;
  const head = [
    `Measure   ${record.measure}, dsp ${record.dspVersion}`,
    `Capture   ${capture.sampleRateHz} Hz, ${capture.channelCount} ch, ${capture.bitsPerSample} bit ${capture.sampleFormat}, ${capture.durationS.toFixed(2)} s`,
    `SHA-256   ${capture.sha256}`,
    `Settings  ${settings.fromS.toFixed(3)} to ${settings.toS.toFixed(3)} s, ${settings.bandLowHz} to ${settings.bandHighHz} Hz, ${settings.fftLength} points, ${settings.window}`,
  ];
  if (stimulus) head.push(`Stimulus  ${stimulus.name}, recognised by ${stimulus.recognisedBy}`);
  const channels = record.channels.flatMap((channel) => [
    '',
    channel.channel,
    ...figureLines(channel),
    ...harmonicLines(channel),
    ...(channel.components.length > 0 ? componentLines(channel) : []),
  ]);
  const between = Object.entries(record.between.figures).map(
    ([key, value]) => `  ${figureLabel(key)}  ${figureText(key, value, undefined).value} ${unitWord(key)}`,
  );
  const warnings = record.warnings.map(
    ({ channel, message }) => `  ${channel ? `${channel}: ` : ''}${message}`,
  );
  return [
    ...head,
    ...channels,
    ...(between.length > 0 ? ['', 'between channels', ...between] : []),
    ...(warnings.length > 0 ? ['', 'Warnings', ...warnings] : []),
    '',
  ].join('\n');
}
