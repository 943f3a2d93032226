import { createJsonReader, type JsonReader } from './json-reader.js';
import { MEASURE_IDS, RECORD_SCHEMA, type BenchRecord } from './record.js';

/** Programmes hold segments and settings hold a baseline; deeper than this is no record of ours. */
const DEEPEST = 4;

/**
 * Reads a record from foreign JSON: one stored, exported or sent by a peer.
 *
 * @param json - a parsed value of any kind; not modified
 * @returns the same value, known to be a record: parts that every record has are there and of the right kind, every
 *   number is finite, figures are numbers, words or null, and traces have x and y of equal length
 * @throws DspInputError `BAD_RECORD` naming the first place that doesn't fit
 */
export function parseRecord(json: unknown): BenchRecord {
  const read = createJsonReader('BAD_RECORD', 'record');
  checkRecord(read, json, '', 0);
  return json as BenchRecord; // checked above, key by key
}

function checkRecord(read: JsonReader, json: unknown, path: string, depth: number): void {
  const top = read.object(json, path);
  read.oneOf(top['schema'], [RECORD_SCHEMA], join(path, 'schema'));
  read.text(top['dspVersion'], join(path, 'dspVersion'));
  const capture = read.object(top['capture'], join(path, 'capture'));
  read.text(capture['sha256'], join(path, 'capture.sha256'));
  read.oneOf(capture['sampleFormat'], ['integer', 'float'], join(path, 'capture.sampleFormat'));
  for (const key of ['sampleRateHz', 'channelCount', 'bitsPerSample', 'frameCount', 'durationS']) {
    read.number(capture[key], join(path, `capture.${key}`));
  }
  checkBody(read, top, path, depth);
}

function checkBody(
  read: JsonReader,
  body: Readonly<Record<string, unknown>>,
  path: string,
  depth: number,
): void {
  if (depth > DEEPEST) read.fail(path, 'records in records', 'an end to them');
  read.oneOf(body['measure'], MEASURE_IDS, join(path, 'measure'));
  checkSettings(read, body['settings'], join(path, 'settings'), depth);
  const reference = read.object(body['reference'], join(path, 'reference'));
  if (reference['unitFullScaleDbfs'] !== null) {
    read.number(reference['unitFullScaleDbfs'], join(path, 'reference.unitFullScaleDbfs'));
  }
  if (body['stimulus'] !== null) {
    read.text(read.object(body['stimulus'], join(path, 'stimulus'))['name'], join(path, 'stimulus.name'));
  }
  read.array(body['channels'], join(path, 'channels')).forEach((entry, index) => {
    checkChannel(read, entry, join(path, `channels.${index}`));
  });
  const between = read.object(body['between'], join(path, 'between'));
  checkFigures(read, between['figures'], join(path, 'between.figures'));
  checkTraces(read, between['traces'], join(path, 'between.traces'));
  read.array(body['findings'], join(path, 'findings'));
  read.array(body['warnings'], join(path, 'warnings')).forEach((entry, index) => {
    read.text(
      read.object(entry, join(path, `warnings.${index}`))['code'],
      join(path, `warnings.${index}.code`),
    );
  });
  read.array(body['segments'], join(path, 'segments')).forEach((entry, index) => {
    const at = join(path, `segments.${index}`);
    checkBody(read, read.object(entry, at), at, depth + 1);
  });
}

function checkSettings(read: JsonReader, value: unknown, path: string, depth: number): void {
  const settings = read.object(value, path);
  for (const key of ['fromS', 'toS', 'fftLength', 'bandLowHz', 'bandHighHz', 'highestHarmonic']) {
    read.number(settings[key], join(path, key));
  }
  read.text(settings['window'], join(path, 'window'));
  if (settings['channel'] !== undefined)
    read.oneOf(settings['channel'], ['left', 'right', 'all'], join(path, 'channel'));
  if (settings['inputRange'] !== undefined) read.text(settings['inputRange'], join(path, 'inputRange'));
  if (settings['descriptor'] !== undefined && settings['descriptor'] !== null) {
    read.object(settings['descriptor'], join(path, 'descriptor'));
  }
  if (settings['calibration'] !== null) read.object(settings['calibration'], join(path, 'calibration'));
  if (settings['baseline'] !== null)
    checkRecord(read, settings['baseline'], join(path, 'baseline'), depth + 1);
}

function checkChannel(read: JsonReader, value: unknown, path: string): void {
  const channel = read.object(value, path);
  read.text(channel['channel'], join(path, 'channel'));
  checkFigures(read, channel['figures'], join(path, 'figures'));
  for (const key of ['limits', 'uncertainty']) {
    for (const [name, entry] of Object.entries(read.object(channel[key], join(path, key)))) {
      read.object(entry, join(path, `${key}.${name}`));
    }
  }
  for (const key of ['harmonics', 'components']) {
    read.array(channel[key], join(path, key)).forEach((entry, index) => {
      checkFigures(read, entry, join(path, `${key}.${index}`));
    });
  }
  checkTraces(read, channel['traces'], join(path, 'traces'));
}

function checkFigures(read: JsonReader, value: unknown, path: string): void {
  for (const [key, figure] of Object.entries(read.object(value, path))) {
    if (figure === null || typeof figure === 'string') continue;
    read.number(figure, join(path, key));
  }
}

function checkTraces(read: JsonReader, value: unknown, path: string): void {
  for (const [name, entry] of Object.entries(read.object(value, path))) {
    const at = join(path, name);
    const trace = read.object(entry, at);
    read.text(trace['xUnit'], join(at, 'xUnit'));
    read.text(trace['yUnit'], join(at, 'yUnit'));
    // The API's traces are links; bytes are fetched apart.
    if (typeof trace['href'] === 'string') continue;
    const x = read.array(trace['x'], join(at, 'x'));
    const y = read.array(trace['y'], join(at, 'y'));
    if (x.length !== y.length) read.fail(at, `${x.length} and ${y.length} points`, 'x and y of equal length');
    x.forEach((point, index) => read.number(point, join(at, `x.${index}`)));
    y.forEach((point, index) => read.number(point, join(at, `y.${index}`)));
  }
}

function join(path: string, key: string): string {
  return path === '' ? key : `${path}.${key}`;
}
