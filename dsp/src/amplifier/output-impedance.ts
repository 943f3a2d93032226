import { DspInputError } from '../errors.js';
import type { RecordBody } from '../record/record.js';

export interface OutputImpedance {
  /** Level without the load less level with it, dB. */
  readonly levelDropDb: number;
  /** Null where the drop does not stand clear of its own uncertainty. */
  readonly outputImpedanceOhm: number | null;
  readonly dampingFactor: number | null;
  /** Expanded, k = 2. */
  readonly expandedUncertaintyOhm: number;
  /** The impedance is no higher; given where there is no figure. */
  readonly belowOhm: number | null;
}

export interface ImpedanceOptions {
  /** As measured, not as printed on it. */
  readonly loadOhm: number;
  /** Of one level against the other in the same range, dB; calibrations cancel. */
  readonly standardUncertaintyDb?: number;
}

/** How well two takes in one range repeat (common practice, no source). */
const USUAL_UNCERTAINTY_DB = 0.001;
const COVERAGE_FACTOR = 2;
/** Two takes at other frequencies are of no one impedance. */
const MOST_FREQUENCY_RATIO = 1.001;

/**
 * Output impedance and damping factor by a change of load.
 *
 * @param drop - level without the load less level with it, dB
 * @throws DspInputError `BAD_ARGUMENT` for a load or an uncertainty that is not above 0, and for a load that raises the level
 * @see IEC 60268-3, output source impedance: Z = R (U0 / UL - 1); damping factor R / Z
 */
export function impedanceOfDrop(
  levelDropDb: number,
  { loadOhm, standardUncertaintyDb = USUAL_UNCERTAINTY_DB }: ImpedanceOptions,
): OutputImpedance {
  if (!(loadOhm > 0)) throw new DspInputError('BAD_ARGUMENT', `a load of ${loadOhm} ohm can't be`);
  if (!(standardUncertaintyDb > 0)) {
    throw new DspInputError('BAD_ARGUMENT', 'the uncertainty of a level must be above 0 dB');
  }
  const impedanceAt = (dropDb: number): number => loadOhm * (10 ** (dropDb / 20) - 1);
  // Both levels are as uncertain as each other.
  const expandedDb = COVERAGE_FACTOR * Math.SQRT2 * standardUncertaintyDb;
  if (levelDropDb < -expandedDb) {
    throw new DspInputError(
      'BAD_ARGUMENT',
      `the take with the load is ${(-levelDropDb).toFixed(3)} dB louder than the one without: are the two exchanged, or the ranges different?`,
    );
  }
  const expandedUncertaintyOhm = impedanceAt(levelDropDb + expandedDb) - impedanceAt(levelDropDb);
  if (levelDropDb <= expandedDb) {
    return {
      levelDropDb,
      outputImpedanceOhm: null,
      dampingFactor: null,
      expandedUncertaintyOhm,
      belowOhm: impedanceAt(Math.max(0, levelDropDb) + expandedDb),
    };
  }
  const outputImpedanceOhm = impedanceAt(levelDropDb);
  return {
    levelDropDb,
    outputImpedanceOhm,
    dampingFactor: loadOhm / outputImpedanceOhm,
    expandedUncertaintyOhm,
    belowOhm: null,
  };
}

export interface ChannelImpedance extends OutputImpedance {
  readonly channel: string;
  readonly frequencyHz: number;
}

/**
 * The same from two takes of a tone, one without the load and one with it, in one range of the recorder.
 *
 * @param unloaded - and `loaded`: records of a tone
 * @returns one entry a channel that both have
 * @throws DspInputError `BAD_RECORD` for another measure, other frequencies, or no level
 */
export function outputImpedance(
  unloaded: Pick<RecordBody, 'measure' | 'channels'>,
  loaded: Pick<RecordBody, 'measure' | 'channels'>,
  options: ImpedanceOptions,
): ChannelImpedance[] {
  for (const { measure } of [unloaded, loaded]) {
    if (measure !== 'tone') {
      throw new DspInputError('BAD_RECORD', `records of a tone are needed, not one of ${measure}`);
    }
  }
  return unloaded.channels.flatMap((one) => {
    const other = loaded.channels.find(({ channel }) => channel === one.channel);
    if (!other) return [];
    const [openHz, loadedHz] = [one, other].map((each) => numberOf(each, 'fundamentalFrequencyHz'));
    if (Math.max(openHz / loadedHz, loadedHz / openHz) > MOST_FREQUENCY_RATIO) {
      throw new DspInputError(
        'BAD_RECORD',
        `the tones of the channel ${one.channel} differ: ${openHz} Hz without the load, ${loadedHz} Hz with it`,
      );
    }
    const dropDb = numberOf(one, 'fundamentalLevelDbfs') - numberOf(other, 'fundamentalLevelDbfs');
    return [{ channel: one.channel, frequencyHz: openHz, ...impedanceOfDrop(dropDb, options) }];
  });
}

function numberOf({ channel, figures }: RecordBody['channels'][number], key: string): number {
  const value = figures[key];
  if (typeof value === 'number') return value;
  throw new DspInputError('BAD_RECORD', `the channel ${channel} has no ${key}`);
}
