import type { FigureUncertainty, Figures, Trace } from '../../record/record.js';
import { powerToDb } from '../../level/decibel.js';
import type { SweepSignal } from '../../stimulus/sweep-signal.js';
import type { ImpulseResponse } from '../shared/deconvolution/create-deconvolver.js';
import { findArrival, type Arrival } from '../shared/deconvolution/find-arrival.js';
import { powerAt, transformCut, type FrequencyResponse } from '../shared/deconvolution/frequency-response.js';
import { gridBins, levelsDb } from '../shared/deconvolution/response-grid.js';
import { wrapPhase } from '../shared/tone-tracker.js';
import { combineUncertainty } from '../shared/uncertainty.js';
import {
  crossingComponents,
  flatnessComponents,
  levelComponents,
  readResponseNoise,
  type ResponseNoise,
} from './response-uncertainty.js';

export const SWEEP_FIGURES = [
  'flatnessDb',
  'minus3DbLowHz',
  'minus3DbHighHz',
  'levelAt20HzDb',
  'levelAt20kHzDb',
] as const;

const REFERENCE_HZ = 1000;
const HIGHEST_HARMONIC = 5;
/** From the highest sample of a response, at most. */
const BEFORE_S = 0.36;
const AFTER_S = 0.5;
/** Share of the time between a response and that of the second harmonic, which comes before it. */
const BEFORE_SHARE = 0.55;
const LOWEST_TRACED_HZ = 5;
const LOWEST_HARMONIC_HZ = 20;
/** A device's own delay beside what the marks say. */
const SEARCH_S = 0.05;
/** Points of the drawn impulse either side of its arrival. */
const IMPULSE_BEFORE_S = 0.002;
const IMPULSE_AFTER_S = 0.01;

export interface ResponseOptions {
  readonly sweep: SweepSignal;
  readonly speed: number;
  /** Band of the sweep as recorded. */
  readonly lowHz: number;
  readonly highHz: number;
  /** Band over which flatness counts. */
  readonly bandLowHz: number;
  readonly bandHighHz: number;
  readonly isClockKnown: boolean;
}

export interface MeasuredResponse {
  readonly arrival: Arrival;
  readonly figures: Figures;
  readonly uncertainty: Readonly<Record<string, FigureUncertainty>>;
  readonly traces: Readonly<Record<string, Trace>>;
  /** Level at 1 kHz against the sweep as sent, dB. */
  readonly gainDb: number;
}

/**
 * Reads response, phase, impulse and harmonics out of one channel's impulse response.
 *
 * @returns null for a channel that the sweep isn't in
 */
export function measureResponse(impulse: ImpulseResponse, options: ResponseOptions): MeasuredResponse | null {
  const { sweep, speed, highHz } = options;
  const arrival = findArrival(impulse, SEARCH_S, highHz);
  if (arrival === null) return null;
  const rateS = sweep.rateS / speed;
  const beforeS = Math.min(BEFORE_S, BEFORE_SHARE * rateS * Math.LN2);
  const cut = { centreS: arrival.delayS, beforeS, afterS: AFTER_S };
  const linear = transformCut(impulse, cut);
  const db = levelsDb(linear);
  const reference = powerToDb(powerAt(linear, REFERENCE_HZ));
  const from1kHz = db.map((level) => level - reference);
  return {
    arrival,
    gainDb: reference,
    ...responseFigures(linear, from1kHz, options, readResponseNoise(impulse, arrival.delayS, linear, cut)),
    traces: {
      response: responseTrace(linear, from1kHz, options),
      ...(options.isClockKnown ? { phase: phaseTrace(linear, options, arrival.isInverted) } : {}),
      impulse: impulseTrace(impulse, arrival),
      ...harmonicTraces(impulse, arrival, linear, rateS, options),
    },
  };
}

function responseFigures(
  { binWidthHz }: FrequencyResponse,
  db: Float64Array,
  { lowHz, highHz, bandLowHz, bandHighHz }: ResponseOptions,
  noiseAt: ResponseNoise,
): Pick<MeasuredResponse, 'figures' | 'uncertainty'> {
  const first = Math.ceil(Math.max(lowHz, bandLowHz) / binWidthHz);
  const last = Math.floor(Math.min(highHz, bandHighHz) / binWidthHz);
  let [least, greatest] = [first, first];
  for (let k = first; k <= last; k++) {
    if (db[k] < db[least]) least = k;
    if (db[k] > db[greatest]) greatest = k;
  }
  const at = (hz: number): number | null =>
    hz >= lowHz && hz <= highHz ? valueAt(db, hz / binWidthHz) : null;
  const low = crossing(db, binWidthHz, -1, lowHz);
  const high = crossing(db, binWidthHz, 1, highHz);
  const figures = {
    flatnessDb: last >= first ? (db[greatest] - db[least]) / 2 : null,
    minus3DbLowHz: low?.frequencyHz ?? null,
    minus3DbHighHz: high?.frequencyHz ?? null,
    levelAt20HzDb: at(20),
    levelAt20kHzDb: at(20_000),
  };
  const components = {
    flatnessDb: flatnessComponents(noiseAt, greatest * binWidthHz, least * binWidthHz),
    minus3DbLowHz:
      low === null ? [] : crossingComponents(noiseAt, low.frequencyHz, REFERENCE_HZ, low.dbPerHz),
    minus3DbHighHz:
      high === null ? [] : crossingComponents(noiseAt, high.frequencyHz, REFERENCE_HZ, high.dbPerHz),
    levelAt20HzDb: levelComponents(noiseAt, 20, REFERENCE_HZ),
    levelAt20kHzDb: levelComponents(noiseAt, 20_000, REFERENCE_HZ),
  };
  const uncertainty: Record<string, FigureUncertainty> = {};
  for (const key of SWEEP_FIGURES) {
    const combined = figures[key] === null ? null : combineUncertainty(components[key]);
    if (combined !== null) uncertainty[key] = combined;
  }
  return { figures, uncertainty };
}

function valueAt(db: Float64Array, place: number): number {
  const k = Math.min(db.length - 2, Math.floor(place));
  return db[k] + (db[k + 1] - db[k]) * (place - k);
}

const HALF_POWER_DB = -3;

interface Crossing {
  readonly frequencyHz: number;
  /** Steepness of the response over this share of an octave around it. */
  readonly dbPerHz: number;
}

const STEEPNESS_OCTAVES = 1 / 12;

/** Where the response first falls by 3 dB, going out from 1 kHz; between bins by dB over the logarithm of frequency. */
function crossing(db: Float64Array, binWidthHz: number, step: 1 | -1, endHz: number): Crossing | null {
  let k = Math.round(REFERENCE_HZ / binWidthHz);
  const isInside = (): boolean => (step > 0 ? k * binWidthHz <= endHz : k * binWidthHz >= endHz && k > 0);
  while (isInside() && db[k] > HALF_POWER_DB) k += step;
  if (!isInside()) return null;
  const before = k - step;
  const share = (HALF_POWER_DB - db[before]) / (db[k] - db[before]);
  const frequencyHz = binWidthHz * before * (k / before) ** share;
  const low = Math.min(before, k, Math.floor((frequencyHz * 2 ** -STEEPNESS_OCTAVES) / binWidthHz));
  const high = Math.max(before, k, Math.ceil((frequencyHz * 2 ** STEEPNESS_OCTAVES) / binWidthHz));
  const top = Math.min(db.length - 1, high);
  return { frequencyHz, dbPerHz: (db[top] - db[low]) / ((top - low) * binWidthHz) };
}

function responseTrace(
  { binWidthHz }: FrequencyResponse,
  db: Float64Array,
  { lowHz, highHz }: ResponseOptions,
): Trace {
  const bins = gridBins(binWidthHz, Math.max(LOWEST_TRACED_HZ, lowHz), highHz);
  return {
    xUnit: 'Hz',
    yUnit: 'dB',
    x: Float64Array.from(bins, (k) => k * binWidthHz),
    y: Float64Array.from(bins, (k) => db[k]),
  };
}

/** Phase with the arrival's delay taken out, degrees, followed from 1 kHz both ways so that it doesn't jump by turns. */
function phaseTrace(
  { re, im, binWidthHz }: FrequencyResponse,
  { lowHz, highHz }: ResponseOptions,
  isInverted: boolean,
): Trace {
  const bins = gridBins(binWidthHz, Math.max(LOWEST_TRACED_HZ, lowHz), highHz);
  const sign = isInverted ? -1 : 1;
  const phases = bins.map((k) => Math.atan2(sign * im[k], sign * re[k]));
  for (let index = 1; index < phases.length; index++) {
    phases[index] = phases[index - 1] + wrapPhase(phases[index] - phases[index - 1]);
  }
  const middle = Math.max(
    0,
    bins.findIndex((k) => k * binWidthHz >= REFERENCE_HZ),
  );
  const turns = Math.round(phases[middle] / (2 * Math.PI)) * 2 * Math.PI;
  return {
    xUnit: 'Hz',
    yUnit: 'deg',
    x: Float64Array.from(bins, (k) => k * binWidthHz),
    y: Float64Array.from(phases, (phase) => ((phase - turns) * 180) / Math.PI + (isInverted ? 180 : 0)),
  };
}

/** The impulse around its arrival, against its greatest magnitude. */
function impulseTrace({ samples, sampleRateHz }: ImpulseResponse, { delayS }: Arrival): Trace {
  const total = samples.length;
  const centre = Math.round(delayS * sampleRateHz);
  const from = centre - Math.round(IMPULSE_BEFORE_S * sampleRateHz);
  const count = Math.round((IMPULSE_BEFORE_S + IMPULSE_AFTER_S) * sampleRateHz);
  const y = Float64Array.from({ length: count }, (_, n) => samples[(((from + n) % total) + total) % total]);
  const peak = y.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  return {
    xUnit: 's',
    yUnit: 'ratio',
    x: Float64Array.from({ length: count }, (_, n) => (from + n) / sampleRateHz - delayS),
    y: y.map((value) => value / peak),
  };
}

/**
 * A harmonic's response comes L ln n before the linear one; each is cut out between its neighbours.
 *
 * @see A. Novak, P. Lotton and L. Simon, "Synchronized Swept-Sine", JAES 63(10), 2015
 */
function harmonicTraces(
  impulse: ImpulseResponse,
  { delayS }: Arrival,
  linear: FrequencyResponse,
  rateS: number,
  { lowHz, highHz }: ResponseOptions,
): Record<string, Trace> {
  const traces: Record<string, Trace> = {};
  for (let order = 2; order <= HIGHEST_HARMONIC; order++) {
    const earlier = rateS * Math.log((order + 1) / order);
    const later = rateS * Math.log(order / (order - 1));
    const response = transformCut(
      impulse,
      {
        centreS: delayS - rateS * Math.log(order),
        beforeS: Math.min(BEFORE_S, 0.5 * earlier),
        afterS: Math.min(BEFORE_S, (1 - BEFORE_SHARE) * later),
      },
      linear.re.length,
    );
    const bins = gridBins(linear.binWidthHz, Math.max(LOWEST_HARMONIC_HZ, lowHz), highHz / order);
    const points = bins.flatMap((k): [number, number][] => {
      const hz = k * linear.binWidthHz;
      const level = powerToDb(powerAt(response, order * hz) / powerAt(linear, hz));
      return Number.isFinite(level) ? [[hz, level]] : [];
    });
    traces[`harmonic${order}`] = {
      xUnit: 'Hz',
      yUnit: 'dBr',
      x: Float64Array.from(points, ([x]) => x),
      y: Float64Array.from(points, ([, y]) => y),
    };
  }
  return traces;
}
