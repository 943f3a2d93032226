import type { BenchRecord, ChannelResult, FigureLimit, RecordBody } from '@benchlark/dsp';
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

/** Traces of a few points against level that are read as a table; the first column is the level played. */
const STEP_TRACES: Readonly<Record<string, readonly (readonly [string, string])[]>> = {
  'level-steps': [
    ['deviation', 'deviation dB'],
    ['thd', 'THD dB'],
    ['thdPlusNoise', 'THD+N dB'],
    ['residual', 'residual dBFS'],
  ],
  'two-tone-steps': [
    ['modulationDistortion', 'modulation dB'],
    ['differenceD2', 'D2 dB'],
    ['differenceD3', 'D3 dB'],
  ],
};

function stepLines(measure: string, { traces }: ChannelResult): string[] {
  const columns = (STEP_TRACES[measure] ?? []).filter(([name]) => name in traces);
  const levels = [...new Set(columns.flatMap(([name]) => Array.from(traces[name]?.x ?? [])))].sort(
    (a, b) => b - a,
  );
  if (levels.length === 0) return [];
  const rows = levels.map((level) => [
    `${level.toFixed(1)} dBFS`,
    ...columns.map(([name]) => {
      const trace = traces[name];
      const index = Array.from(trace?.x ?? []).indexOf(level);
      return trace && index >= 0 ? (trace.y[index] ?? 0).toFixed(name === 'deviation' ? 3 : 1) : '-';
    }),
  ]);
  const table = [['played', ...columns.map(([, words]) => words)], ...rows];
  const widths =
    table[0]?.map((_, column) => Math.max(...table.map((row) => (row[column] ?? '').length))) ?? [];
  return table.map((row) => `  ${row.map((cell, column) => cell.padStart(widths[column] ?? 0)).join('  ')}`);
}

/** What a record and each part of a programme have alike. */
function bodyLines(body: RecordBody): string[] {
  const channels = body.channels.flatMap((channel) => {
    const lines = [
      ...(Object.keys(channel.figures).length > 0 ? figureLines(channel) : []),
      ...harmonicLines(channel),
      ...(channel.components.length > 0 ? componentLines(channel) : []),
      ...stepLines(body.measure, channel),
    ];
    return lines.length > 0 ? ['', channel.channel, ...lines] : [];
  });
  const between = layOut(
    Object.entries(body.between.figures).map(([key, value]) => [
      `  ${figureLabel(key)}`,
      figureText(key, value, undefined).value,
      unitWord(key),
    ]),
  );
  const warnings = body.warnings.map(
    ({ channel, message }) => `  ${channel ? `${channel}: ` : ''}${message}`,
  );
  return [
    ...channels,
    ...(between.length > 0 ? ['', 'of all channels', ...between] : []),
    ...(warnings.length > 0 ? ['', 'Warnings', ...warnings] : []),
  ];
}

function findingLines({ findings }: BenchRecord): string[] {
  if (findings.length === 0) return [];
  return [
    '',
    'Proposed',
    ...findings.flatMap(({ severity, summary, evidence, confirmBy }) => [
      `  ${severity}: ${summary}`,
      `      ${evidence.map(({ figure, value, unit }) => `${figure} ${Number(value.toPrecision(4))} ${unit}`.trim()).join('; ')}`,
      `      To confirm: ${confirmBy}`,
    ]),
  ];
}

/** Writes a record as a person reads it: what was measured and how, what it shows, figures, what to heed, part by part. */
export function printRecord(record: BenchRecord): string {
  const { capture, settings, stimulus } = record;
  const transform = settings.fftLength > 0 ? `, ${settings.fftLength} points, ${settings.window}` : '';
  const head = [
    `Measure   ${record.measure}, dsp ${record.dspVersion}`,
    `Capture   ${capture.sampleRateHz} Hz, ${capture.channelCount} ch, ${capture.bitsPerSample} bit ${capture.sampleFormat}, ${capture.durationS.toFixed(2)} s`,
    `SHA-256   ${capture.sha256}`,
    `Settings  ${settings.fromS.toFixed(3)} to ${settings.toS.toFixed(3)} s, ${settings.bandLowHz} to ${settings.bandHighHz} Hz${transform}`,
  ];
  if (stimulus) head.push(`Stimulus  ${stimulus.name}, recognised by ${stimulus.recognisedBy}`);
  const segments = record.segments.flatMap((segment) => {
    const name = segment.stimulus?.name ?? segment.measure;
    const { fromS, toS } = segment.settings;
    return [
      '',
      `== ${segment.measure} (${name}), ${fromS.toFixed(2)} to ${toS.toFixed(2)} s`,
      ...bodyLines(segment),
    ];
  });
  return [...head, ...findingLines(record), ...bodyLines(record), ...segments, ''].join('\n');
}
