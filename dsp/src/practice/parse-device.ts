import { createJsonReader, type JsonObject, type JsonReader } from '../record/json-reader.js';
import { DEVICE_SCHEMA, type PracticeDevice, type PracticeStage, type StageKind } from './device.js';
import { STAGE_RULES, type KeyRule } from './stage-rules.js';

const STAGE_KINDS = Object.keys(STAGE_RULES) as StageKind[]; // the record's keys are the kinds, no more and no fewer

function readNumber(
  read: JsonReader,
  value: unknown,
  rule: KeyRule & { is: 'number' | 'numbers' },
  path: string,
): number {
  const number = read.number(value, path);
  if (number < rule.low || number > rule.high) {
    return read.fail(path, value, `a number from ${rule.low} to ${rule.high}`);
  }
  if (rule.is === 'number' && rule.isWhole && !Number.isInteger(number)) {
    return read.fail(path, value, 'a whole number');
  }
  return number;
}

function readValue(read: JsonReader, value: unknown, rule: KeyRule, path: string): unknown {
  switch (rule.is) {
    case 'choice':
      return read.oneOf(value, rule.of, path);
    case 'numbers': {
      const entries = read.array(value, path);
      if (entries.length === 0) read.fail(path, value, 'a list of at least one number');
      return entries.map((entry, index) => readNumber(read, entry, rule, `${path}[${index}]`));
    }
    case 'number':
      return readNumber(read, value, rule, path);
  }
}

/** Holds what one key alone can't tell. */
function checkTogether(read: JsonReader, kind: StageKind, stage: JsonObject, path: string): void {
  const isPresent = (key: string) => stage[key] !== undefined;
  if (kind === 'jitter') {
    const isSinusoidal = isPresent('peakToPeakPs') && isPresent('frequencyHz') && !isPresent('rmsPs');
    const isRandom = isPresent('rmsPs') && !isPresent('peakToPeakPs') && !isPresent('frequencyHz');
    if (!isSinusoidal && !isRandom) {
      read.fail(path, stage, 'either peakToPeakPs and frequencyHz or rmsPs alone');
    }
  }
  if (kind === 'filter') {
    const isPass = stage['type'] === 'low-pass' || stage['type'] === 'high-pass';
    if (!isPass && !isPresent('gainDb')) read.fail(`${path}.gainDb`, undefined, 'a gain');
    if (!isPass && isPresent('order'))
      read.fail(`${path}.order`, stage['order'], 'nothing, outside a low or high pass,');
    if (isPass && isPresent('gainDb'))
      read.fail(`${path}.gainDb`, stage['gainDb'], 'nothing, in a low or high pass,');
    if (stage['type'] !== 'shelf' && isPresent('side'))
      read.fail(`${path}.side`, stage['side'], 'nothing, outside a shelf,');
    if (isPass && isPresent('q') && (stage['order'] ?? 2) !== 2) {
      read.fail(`${path}.q`, stage['q'], 'nothing, unless the order is 2,');
    }
  }
}

function readStage(read: JsonReader, value: unknown, index: number): PracticeStage {
  const place = `stages[${index}]`;
  const stage = read.object(value, place);
  const kind = read.oneOf(stage['kind'], STAGE_KINDS, `${place}.kind`);
  const path = `${place} (${kind})`;
  const { needs, allows = {}, isCommon } = STAGE_RULES[kind];
  const channel = read.oneOf(
    stage['channel'] ?? 'both',
    isCommon ? ['both'] : ['both', 'left', 'right'],
    `${path}.channel`,
  );
  const rules = { ...allows, ...needs };
  const stranger = Object.keys(stage).find((key) => key !== 'kind' && key !== 'channel' && !(key in rules));
  if (stranger !== undefined) {
    read.fail(
      `${path}.${stranger}`,
      stage[stranger],
      `no such key (there are ${Object.keys(rules).join(', ')})`,
    );
  }
  const keys = Object.keys(rules).filter((key) => key in needs || stage[key] !== undefined);
  const entries = keys.map((key) => [key, readValue(read, stage[key], rules[key], `${path}.${key}`)]);
  checkTogether(read, kind, stage, path);
  // Each key was held against the rule of its kind, which the union's members mirror.
  return { kind, channel, ...Object.fromEntries(entries) } as PracticeStage;
}

/**
 * Reads a practice device from foreign JSON.
 *
 * @param json - a parsed value of any kind; not modified
 * @returns the device; a stage without `channel` is on both, a device without `sampleRateHz` takes any rate, and one
 *   without `seed` has seed 1
 * @throws DspInputError `BAD_DEVICE` naming the first stage and key that don't fit, unknown keys included
 */
export function parseDevice(json: unknown): PracticeDevice {
  const read = createJsonReader('BAD_DEVICE', 'practice device');
  const top = read.object(json, '');
  const schema = read.oneOf(top['schema'], [DEVICE_SCHEMA], 'schema');
  const name = read.text(top['name'], 'name');
  if (name === '') read.fail('name', name, 'a name');
  const seed = read.number(top['seed'] ?? 1, 'seed');
  if (!Number.isInteger(seed) || seed < 0 || seed > 0xffffffff) {
    read.fail('seed', seed, 'a whole number from 0 to 4294967295');
  }
  const rate = top['sampleRateHz'] ?? null;
  const sampleRateHz = rate === null ? null : read.number(rate, 'sampleRateHz');
  if (sampleRateHz !== null && !(sampleRateHz > 0)) read.fail('sampleRateHz', rate, 'a rate above 0');
  const stages = read.array(top['stages'], 'stages').map((stage, index) => readStage(read, stage, index));
  return { schema, name, sampleRateHz, seed, stages };
}
