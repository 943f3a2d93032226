import { DspInputError } from '../errors.js';
import { dbToRatio, powerToDb, ratioToDb } from '../level/decibel.js';
import type { Calibration, RecordBody, Trace } from '../record/record.js';

export interface PowerAtLimit {
  /** THD+N in percent at which it is read. */
  readonly thdPlusNoisePercent: number;
  /** Null where the limit isn't crossed within the steps. */
  readonly powerW: number | null;
  /** Of the steps on either side of the limit. */
  readonly lowW: number | null;
  readonly highW: number | null;
  /** Why there is none. */
  readonly why: 'never-reached' | 'exceeded-throughout' | null;
}

export interface ChannelPower {
  readonly channel: string;
  /** THD+N in dB over output power in W, ascending. */
  readonly thdPlusNoise: Trace;
  /** Power in W over the level played, dBFS. */
  readonly power: Trace;
  readonly atLimits: readonly PowerAtLimit[];
  /** Output against input; null without the volts that 0 dBFS is at the input. */
  readonly gainDb: number | null;
}

export interface PowerOptions {
  /** As measured, ohms. */
  readonly loadOhm: number;
  /** Of the recorder: V RMS at the unit's output for a sine of 0 dBFS, a divider counted in. */
  readonly calibration: Calibration;
  /** V RMS at the unit's input for a sine of 0 dBFS. */
  readonly inputFullScaleVrms?: number | null;
  readonly limitsPercent?: readonly number[];
}

const USUAL_LIMITS_PERCENT = [0.1, 1, 10] as const;
/** The gain is read well below the limit and well above the noise. */
const GAIN_AT_DBFS = -20;

/** U² / R. */
export function powerOf(voltageVrms: number, loadOhm: number): number {
  return voltageVrms ** 2 / loadOhm;
}

/** dB against 1 W. */
export const wattsToDbw = powerToDb;

/**
 * Output power against level, and where distortion reaches its limits.
 *
 * THD+N in dB is taken as linear in the output level in dB between the steps on both sides of a limit, where it is crossed
 * upward for the last time; with steps of 1 dB the power at a limit is then good to a few tenths of a decibel, and the
 * steps' own powers are given beside it.
 *
 * @param record - of level steps, with its traces
 * @throws DspInputError `BAD_RECORD` for another measure or without traces; `BAD_ARGUMENT` for a load not above 0;
 *   `BAD_CALIBRATION` for a channel that it lacks
 * @see IEC 60268-3, distortion-limited output power (clause number from memory)
 */
export function outputPower(
  record: Pick<RecordBody, 'measure' | 'channels'>,
  { loadOhm, calibration, inputFullScaleVrms = null, limitsPercent = USUAL_LIMITS_PERCENT }: PowerOptions,
): ChannelPower[] {
  if (record.measure !== 'level-steps') {
    throw new DspInputError('BAD_RECORD', `a record of level steps is needed, not one of ${record.measure}`);
  }
  if (!(loadOhm > 0)) throw new DspInputError('BAD_ARGUMENT', `a load of ${loadOhm} ohm can't be`);
  return record.channels.map(({ channel, traces }) => {
    const fullScaleVrms = calibration.channels.find((one) => one.channel === channel)?.fullScaleVrms;
    if (fullScaleVrms === undefined) {
      throw new DspInputError('BAD_CALIBRATION', `there is no calibration of the channel ${channel}`);
    }
    const steps = stepsOf(traces, channel).map((step) => ({
      ...step,
      powerW: powerOf(fullScaleVrms * dbToRatio(step.measuredDbfs), loadOhm),
    }));
    const byPower = [...steps].sort((a, b) => a.powerW - b.powerW);
    const byLevel = [...steps].sort((a, b) => a.playedDbfs - b.playedDbfs);
    return {
      channel,
      thdPlusNoise: trace(byPower, 'W', 'dB', (step) => [step.powerW, step.thdPlusNoiseDb]),
      power: trace(byLevel, 'dBFS', 'W', (step) => [step.playedDbfs, step.powerW]),
      atLimits: limitsPercent.map((percent) => atLimit(byPower, percent)),
      gainDb: gainOf(byLevel, fullScaleVrms, inputFullScaleVrms),
    };
  });
}

interface Step {
  readonly playedDbfs: number;
  readonly measuredDbfs: number;
  readonly thdPlusNoiseDb: number;
}

interface PoweredStep extends Step {
  readonly powerW: number;
}

function stepsOf(traces: Readonly<Record<string, Trace>>, channel: string): Step[] {
  const { measuredLevel, thdPlusNoise } = traces;
  if (!measuredLevel || !thdPlusNoise) {
    throw new DspInputError('BAD_RECORD', `the channel ${channel} lacks the traces of its steps`);
  }
  const thdAt = new Map(Array.from(thdPlusNoise.x, (level, n) => [level, thdPlusNoise.y[n]] as const));
  return Array.from(measuredLevel.x, (playedDbfs, n) => ({
    playedDbfs,
    measuredDbfs: measuredLevel.y[n],
    thdPlusNoiseDb: thdAt.get(playedDbfs) ?? NaN,
  })).filter((step) => Number.isFinite(step.measuredDbfs) && Number.isFinite(step.thdPlusNoiseDb));
}

function trace(
  steps: readonly PoweredStep[],
  xUnit: string,
  yUnit: string,
  point: (step: PoweredStep) => readonly [number, number],
): Trace {
  const points = steps.map(point);
  return { xUnit, yUnit, x: points.map(([x]) => x), y: points.map(([, y]) => y) };
}

function atLimit(steps: readonly PoweredStep[], thdPlusNoisePercent: number): PowerAtLimit {
  const limitDb = ratioToDb(thdPlusNoisePercent / 100);
  const none = { thdPlusNoisePercent, powerW: null, lowW: null, highW: null };
  const top = steps.at(-1);
  if (!top || top.thdPlusNoiseDb < limitDb) return { ...none, why: 'never-reached' };
  // From the top down: the last step that still keeps the limit.
  let below = steps.length - 1;
  while (below >= 0 && steps[below].thdPlusNoiseDb >= limitDb) below -= 1;
  if (below < 0) return { ...none, why: 'exceeded-throughout' };
  const [low, high] = [steps[below], steps[below + 1]];
  const share = (limitDb - low.thdPlusNoiseDb) / (high.thdPlusNoiseDb - low.thdPlusNoiseDb);
  const powerDbw = wattsToDbw(low.powerW) + share * (wattsToDbw(high.powerW) - wattsToDbw(low.powerW));
  return {
    thdPlusNoisePercent,
    powerW: 10 ** (powerDbw / 10),
    lowW: low.powerW,
    highW: high.powerW,
    why: null,
  };
}

function gainOf(
  steps: readonly PoweredStep[],
  outputFullScaleVrms: number,
  inputFullScaleVrms: number | null,
): number | null {
  if (inputFullScaleVrms === null) return null;
  const nearest = steps.reduce<PoweredStep | null>(
    (best, step) =>
      best === null || Math.abs(step.playedDbfs - GAIN_AT_DBFS) < Math.abs(best.playedDbfs - GAIN_AT_DBFS)
        ? step
        : best,
    null,
  );
  if (nearest === null) return null;
  return nearest.measuredDbfs - nearest.playedDbfs + ratioToDb(outputFullScaleVrms / inputFullScaleVrms);
}
