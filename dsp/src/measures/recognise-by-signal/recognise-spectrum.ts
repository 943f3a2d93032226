import { powerToDb } from '../../level/decibel.js';
import { sumBand } from '../../spectrum/integrate-band.js';
import type { PowerSpectrum } from '../../spectrum/power-spectrum.js';
import { removeLobes } from '../../spectrum/remove-lobes.js';
import { findSpurs } from '../shared/find-spurs.js';
import type { ChannelScan } from '../shared/scan-segment.js';
import { shortNumber } from '../shared/settings-band.js';
import type { SignalRecognition } from './signal-recognition.js';

/** Tells what is steady and no single tone by its spectrum; null for anything else. */
export function recogniseSpectrum({ spectrum }: ChannelScan): SignalRecognition | null {
  const lines = strongLines(spectrum);
  return recogniseComb(lines) ?? recognisePair(lines) ?? recogniseNoise(spectrum, lines);
}

interface Line {
  readonly frequencyHz: number;
  readonly power: number;
}

function strongLines(spectrum: PowerSpectrum): Line[] {
  const spurs = findSpurs(spectrum, { lowHz: 15, highHz: spectrum.sampleRateHz / 2 });
  const { lobes } = removeLobes(
    spectrum,
    spurs.map(({ frequencyHz }) => frequencyHz),
  );
  return lobes
    .map(({ frequencyHz, power }) => ({ frequencyHz, power }))
    .filter(({ power }) => power > 0)
    .sort((one, other) => other.power - one.power);
}

/** The second tone of a pair is no weaker than this against the first, power … */
const WEAKER = 0.03;
/** … and nothing else stronger than this against the second. */
const REST = 0.1;

function recognisePair(lines: readonly Line[]): SignalRecognition | null {
  if (lines.length < 2) return null;
  const [first, second, third] = lines;
  const rest = lines.length > 2 ? third.power : 0;
  const ratio =
    Math.max(first.frequencyHz, second.frequencyHz) / Math.min(first.frequencyHz, second.frequencyHz);
  const isHarmonic = Math.abs(ratio - Math.round(ratio)) < 1e-3 && ratio < 10.5;
  if (second.power < WEAKER * first.power || rest > REST * second.power || isHarmonic) return null;
  const [low, high] = [first.frequencyHz, second.frequencyHz].sort((one, other) => one - other);
  return {
    measure: 'two-tone',
    why: `it holds two steady tones, ${shortNumber(Number(low.toPrecision(5)))} and ${shortNumber(Number(high.toPrecision(5)))} Hz`,
  };
}

/** So many of the strongest lines lie on third-octaves … */
const LEAST_TONES = 15;
/** … within this of their places. */
const SAME_PLACE = 0.004;

function recogniseComb(lines: readonly Line[]): SignalRecognition | null {
  const strongest = lines.at(0)?.power ?? 0;
  const strong = lines.filter(({ power }) => power > 1e-3 * strongest);
  const onComb = strong.filter(({ frequencyHz }) => {
    const band = 10 * Math.log10(frequencyHz / 1000);
    return Math.abs(10 ** ((band - Math.round(band)) / 10) - 1) < SAME_PLACE;
  });
  const bands = new Set(onComb.map(({ frequencyHz }) => Math.round(10 * Math.log10(frequencyHz / 1000))));
  if (bands.size < LEAST_TONES || onComb.length < 0.7 * strong.length) return null;
  return { measure: 'multitone', why: `it holds ${bands.size} steady tones a third of an octave apart` };
}

/** Lines hold less than this of a noise's power. */
const LINES_SHARE = 0.02;
/** Octaves of white noise grow by 3 dB and of pink noise by nothing, within this. */
const SLOPE_DB = 1.2;
const FIRST_OCTAVE_HZ = 160;

function recogniseNoise(spectrum: PowerSpectrum, lines: readonly Line[]): SignalRecognition | null {
  const total = sumBand(spectrum, 20, spectrum.sampleRateHz / 2);
  const inLines = lines.reduce((sum, { power }) => sum + power, 0);
  if (!(total > 0) || inLines > LINES_SHARE * total) return null;
  const octaves: number[] = [];
  for (let low = FIRST_OCTAVE_HZ; 2 * low <= 0.3 * spectrum.sampleRateHz; low *= 2) {
    octaves.push(powerToDb(sumBand(spectrum, low, 2 * low)));
  }
  const slopes = octaves.slice(1).map((level, index) => level - octaves[index]);
  if (slopes.length < 3) return null;
  const isSloped = (wanted: number): boolean => slopes.every((slope) => Math.abs(slope - wanted) < SLOPE_DB);
  if (isSloped(10 * Math.log10(2))) {
    return {
      measure: 'filter',
      why: 'it holds steady noise that is alike at every frequency, as white noise is',
    };
  }
  if (isSloped(0)) {
    return {
      measure: 'loudness',
      why: 'it holds steady noise that is alike in every octave, as pink noise is',
    };
  }
  return null;
}
