import { createJsonReader } from './json-reader.js';
import type { Calibration } from './record.js';

/**
 * Reads a calibration from foreign JSON.
 *
 * @param json - a parsed value of any kind; not modified
 * @returns the calibration with its known keys alone
 * @throws DspInputError `BAD_CALIBRATION` naming the first place that doesn't fit
 */
export function parseCalibration(json: unknown): Calibration {
  const read = createJsonReader('BAD_CALIBRATION', 'calibration');
  const top = read.object(json, '');
  const channels = read.array(top['channels'], 'channels').map((entry, index) => {
    const at = `channels.${index}`;
    const channel = read.object(entry, at);
    const fullScaleVrms = read.number(channel['fullScaleVrms'], `${at}.fullScaleVrms`);
    if (fullScaleVrms <= 0) read.fail(`${at}.fullScaleVrms`, fullScaleVrms, 'a voltage above 0');
    const expandedPercent = read.number(channel['expandedPercent'], `${at}.expandedPercent`);
    if (expandedPercent < 0) read.fail(`${at}.expandedPercent`, expandedPercent, 'a percentage of 0 or more');
    return { channel: read.text(channel['channel'], `${at}.channel`), fullScaleVrms, expandedPercent };
  });
  if (channels.length === 0) read.fail('channels', [], 'at least one channel');
  const names = channels.map(({ channel }) => channel);
  if (new Set(names).size !== names.length) read.fail('channels', names, 'each channel once');
  const sampleRateHz =
    top['sampleRateHz'] === undefined ? undefined : read.number(top['sampleRateHz'], 'sampleRateHz');
  if (sampleRateHz !== undefined && sampleRateHz <= 0)
    read.fail('sampleRateHz', sampleRateHz, 'a rate above 0');
  return {
    schema: read.oneOf(top['schema'], ['benchlark-calibration/1'], 'schema'),
    date: read.text(top['date'], 'date'),
    ...(sampleRateHz === undefined ? {} : { sampleRateHz }),
    ...(top['inputRange'] === undefined ? {} : { inputRange: read.text(top['inputRange'], 'inputRange') }),
    channels,
  };
}
