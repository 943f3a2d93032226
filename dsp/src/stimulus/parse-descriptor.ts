import { MEASURE_IDS } from '../record/record.js';
import { createJsonReader, type JsonReader } from '../record/json-reader.js';
import {
  STIMULUS_SCHEMA,
  type StimulusBits,
  type StimulusDescriptor,
  type StimulusMark,
  type StimulusPart,
  type StimulusStep,
} from './descriptor.js';

const CHANNELS = ['both', 'left', 'right'] as const;

function readWhole(read: JsonReader, value: unknown, path: string, low: number, high: number): number {
  const number = read.number(value, path);
  if (Number.isInteger(number) && number >= low && number <= high) return number;
  return read.fail(path, value, `a whole number from ${low} to ${high}`);
}

function readSpan(read: JsonReader, span: Readonly<Record<string, unknown>>, path: string) {
  const fromS = read.number(span['fromS'], `${path}.fromS`);
  const toS = read.number(span['toS'], `${path}.toS`);
  if (fromS < 0) read.fail(`${path}.fromS`, fromS, 'a time of 0 or more');
  if (toS <= fromS) read.fail(`${path}.toS`, toS, 'a time after fromS');
  return { fromS, toS };
}

function readParameters(read: JsonReader, value: unknown, path: string): Record<string, number | string> {
  const entries = Object.entries(read.object(value, path)).map(([key, entry]): [string, number | string] => {
    const isFit = typeof entry === 'string' || (typeof entry === 'number' && Number.isFinite(entry));
    return [key, isFit ? entry : read.fail(`${path}.${key}`, entry, 'a number or a text')];
  });
  return Object.fromEntries(entries);
}

function readBits(read: JsonReader, value: unknown): StimulusBits {
  return value === 16 || value === 24 || value === '32f'
    ? value
    : read.fail('bitsPerSample', value, '16, 24 or "32f"');
}

function readMark(read: JsonReader, value: unknown, path: string): StimulusMark {
  const mark = read.object(value, path);
  const atS = read.number(mark['atS'], `${path}.atS`);
  if (atS < 0) read.fail(`${path}.atS`, atS, 'a time of 0 or more');
  return { kind: read.oneOf(mark['kind'], ['start', 'end'], `${path}.kind`), atS };
}

function readStep(read: JsonReader, value: unknown, path: string): StimulusStep {
  const step = read.object(value, path);
  return { levelDbfs: read.number(step['levelDbfs'], `${path}.levelDbfs`), ...readSpan(read, step, path) };
}

function readPart(read: JsonReader, value: unknown, path: string): StimulusPart {
  const part = read.object(value, path);
  const steps = read.array(part['steps'], `${path}.steps`);
  return {
    measure: read.oneOf(part['measure'], MEASURE_IDS, `${path}.measure`),
    channels: read.oneOf(part['channels'], CHANNELS, `${path}.channels`),
    ...readSpan(read, part, path),
    parameters: readParameters(read, part['parameters'], `${path}.parameters`),
    steps: steps.map((step, index) => readStep(read, step, `${path}.steps.${index}`)),
  };
}

/**
 * Reads a stimulus's descriptor from foreign JSON.
 *
 * @param json - a parsed value of any kind; not modified
 * @returns the descriptor with its known keys alone
 * @throws DspInputError `BAD_DESCRIPTOR` naming the first key that doesn't fit
 */
export function parseDescriptor(json: unknown): StimulusDescriptor {
  const read = createJsonReader('BAD_DESCRIPTOR', "stimulus's descriptor");
  const top = read.object(json, '');
  const schema = read.oneOf(top['schema'], [STIMULUS_SCHEMA], 'schema');
  const name = read.text(top['name'], 'name');
  if (name === '') read.fail('name', name, 'a name');
  const sha256 = read.text(top['sha256'], 'sha256');
  // Empty while the file that it describes isn't written yet.
  if (!/^([0-9a-f]{64})?$/.test(sha256)) read.fail('sha256', sha256, '64 hexadecimal digits');
  return {
    schema,
    name,
    parameters: readParameters(read, top['parameters'], 'parameters'),
    sampleRateHz: readWhole(read, top['sampleRateHz'], 'sampleRateHz', 1, 1e7),
    bitsPerSample: readBits(read, top['bitsPerSample']),
    dither: read.oneOf(top['dither'], ['tpdf', 'none'], 'dither'),
    seed: readWhole(read, top['seed'], 'seed', 0, 0xffffffff),
    channels: read.oneOf(top['channels'], CHANNELS, 'channels'),
    frameCount: readWhole(read, top['frameCount'], 'frameCount', 1, Number.MAX_SAFE_INTEGER),
    sha256,
    marks: read.array(top['marks'], 'marks').map((mark, index) => readMark(read, mark, `marks.${index}`)),
    parts: read.array(top['parts'], 'parts').map((part, index) => readPart(read, part, `parts.${index}`)),
  };
}
