import type { FigureValue } from '@benchlark/dsp';
import type { StoredRecord } from './stored-record';
import { unitWord } from './unit-word';

const HEADINGS = [
  'segment',
  'measure',
  'channel',
  'figure',
  'value',
  'unit',
  'limited by',
  'margin dB',
  'expanded uncertainty',
  'from s',
  'to s',
];

/** RFC 4180; a text that a spreadsheet would take for a formula is shown as text. */
function cell(value: string | number | null | undefined): string {
  if (value === null || value === undefined) return '';
  if (typeof value === 'number') return String(value);
  const safe = /^[=+\-@\t\r]/.test(value) ? `'${value}` : value;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}

interface FigureBody {
  readonly figures: Readonly<Record<string, FigureValue>>;
  readonly limits?: Readonly<Record<string, { by: string; marginDb: number | null }>>;
  readonly uncertainty?: Readonly<Record<string, { expanded: number }>>;
}

/** Every figure of a record as one line each. */
export function figuresCsv(record: StoredRecord): string {
  const lines = [HEADINGS.map(cell).join(',')];
  const bodies = [record, ...record.segments] as unknown as StoredRecord[]; // segments lack only the head's keys
  bodies.forEach(({ measure, settings, channels, between }, segment) => {
    const add = (channel: string, { figures, limits, uncertainty }: FigureBody): void => {
      for (const [key, value] of Object.entries(figures)) {
        const { by, marginDb } = limits?.[key] ?? {};
        const row = [
          segment,
          measure,
          channel,
          key,
          value,
          unitWord(key),
          by,
          marginDb,
          uncertainty?.[key]?.expanded,
        ];
        lines.push([...row, settings.fromS, settings.toS].map(cell).join(','));
      }
    };
    for (const channel of channels) {
      const body = channel as unknown as FigureBody & { channel: string };
      add(body.channel, body);
    }
    add('between', between as unknown as FigureBody);
  });
  return `${lines.join('\r\n')}\r\n`;
}
