import { meanSquareToDbfs, powerToDb } from '../../level/decibel.js';
import { makeWarning } from '../../record/make-warning.js';
import type { Warning } from '../../record/record.js';
import type { PowerSpectrum } from '../../spectrum/power-spectrum.js';
import { findMains, isMainsLine, resolvesMains } from '../shared/find-mains.js';
import { findSpurs } from '../shared/find-spurs.js';
import type { ChannelScan } from '../shared/scan-segment.js';
import { shortLevel, shortNumber, type Band } from '../shared/settings-band.js';
import type { ToneTrack } from '../shared/tone-tracker.js';
import type { Distortion } from './distortion.js';

const LOW_LEVEL_DBFS = -40;
const UNSTEADY_DB = 0.1;
/** Times the scatter that noise gives the frames' levels. */
const UNSTEADY_DEVIATIONS = 8;
const UNSTEADY_BINS = 0.2;
const NOISE_FIGURES = ['thdPlusNoiseDb', 'thdPlusNoisePercent', 'sinadDb', 'snrDb', 'enobBits', 'noiseDbfs'];
const THD_FIGURES = ['thdDb', 'thdPercent'];

/** What a person should know of a channel's tone before trusting its figures. */
export function toneWarnings(
  scan: ChannelScan,
  tone: ToneTrack,
  parts: Distortion,
  band: Band,
  expectLow: boolean,
): Warning[] {
  const { channel, spectrum } = scan;
  const warnings: Warning[] = [];
  const levelDbfs = meanSquareToDbfs(parts.fundamental);
  if (!expectLow && levelDbfs < LOW_LEVEL_DBFS) {
    warnings.push(
      makeWarning('level-too-low', { level: shortLevel(levelDbfs) }, { channel, figures: NOISE_FIGURES }),
    );
  }
  const change = unsteadiness(tone, parts, spectrum);
  if (change !== null) {
    warnings.push(
      makeWarning(
        'tone-not-steady',
        { change },
        { channel, figures: ['fundamentalLevelDbfs', ...NOISE_FIGURES] },
      ),
    );
  }
  if (tone.frequencyHz < band.lowHz || tone.frequencyHz > band.highHz) {
    const values = { frequency: shortNumber(tone.frequencyHz) };
    warnings.push(
      makeWarning('tone-outside-band', values, {
        channel,
        figures: ['thdPlusNoiseDb', 'thdPlusNoisePercent'],
      }),
    );
  }
  if (parts.harmonics.length === 0) {
    const values = { frequency: shortNumber(tone.frequencyHz) };
    warnings.push(makeWarning('no-harmonics-in-band', values, { channel, figures: THD_FIGURES }));
  } else if (parts.harmonicPower === null) {
    const below =
      parts.harmonicBound > 0 ? shortLevel(powerToDb(parts.harmonicBound / parts.fundamental)) : 'any';
    warnings.push(makeWarning('harmonics-in-noise', { below }, { channel, figures: THD_FIGURES }));
  }
  if (parts.noise.flat.meanSquare === 0) {
    warnings.push(makeWarning('nothing-left', { channel }, { channel, figures: NOISE_FIGURES }));
  }
  return [...warnings, ...humWarnings(scan, tone, parts, band)];
}

function unsteadiness(tone: ToneTrack, parts: Distortion, spectrum: PowerSpectrum): string | null {
  // A frame's level scatters as the square root of the averages more than the mean's.
  const frameDeviationDb =
    (4.343 * Math.sqrt(parts.fundamentalVariance * Math.max(1, spectrum.effectiveAverages))) /
    parts.fundamental;
  if (tone.levelSpreadDb > Math.max(UNSTEADY_DB, UNSTEADY_DEVIATIONS * frameDeviationDb)) {
    return `its level moves by ${tone.levelSpreadDb.toFixed(2)} dB`;
  }
  // Noise moves the place of a weak line within its lobe; relative scatter of amplitude is about that of place in bins.
  const allowedBins = Math.max(UNSTEADY_BINS, UNSTEADY_DEVIATIONS * (frameDeviationDb / 8.686));
  if (tone.frequencySpreadBins > allowedBins) {
    return `its frequency moves by ${shortNumber(Number((tone.frequencySpreadBins * spectrum.binWidthHz).toPrecision(2)))} Hz`;
  }
  return null;
}

function humWarnings(scan: ChannelScan, tone: ToneTrack, parts: Distortion, band: Band): Warning[] {
  const { channel, spectrum } = scan;
  if (!resolvesMains(spectrum)) return [];
  const reachHz = 2 * spectrum.exclusionHalfWidthBins * spectrum.binWidthHz;
  const isOfTone = (frequencyHz: number): boolean => {
    const order = Math.max(1, Math.round(frequencyHz / tone.frequencyHz));
    return Math.abs(frequencyHz - order * tone.frequencyHz) < reachHz;
  };
  const others = findSpurs(spectrum, band).filter(({ frequencyHz }) => !isOfTone(frequencyHz));
  const mains = findMains(spectrum, others);
  if (mains === null) return [];
  const warnings: Warning[] = [];
  if (mains.meanSquare > parts.residual.meanSquare / 2) {
    const values = {
      level: shortLevel(meanSquareToDbfs(mains.meanSquare)),
      frequency: mains.frequencyHz.toFixed(2),
    };
    warnings.push(makeWarning('hum-in-residual', values, { channel, figures: NOISE_FIGURES }));
  }
  const coincides = [1, ...parts.harmonics.map(({ order }) => order)].some((order) => {
    const frequencyHz = order * tone.frequencyHz;
    return frequencyHz < 1000 && isMainsLine(spectrum, frequencyHz, mains.frequencyHz);
  });
  if (coincides) {
    warnings.push(
      makeWarning(
        'hum-on-harmonic',
        { frequency: mains.frequencyHz.toFixed(2) },
        { channel, figures: THD_FIGURES },
      ),
    );
  }
  return warnings;
}
