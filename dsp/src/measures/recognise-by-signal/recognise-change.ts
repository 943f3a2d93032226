import type { SampleSource } from '../../source/sample-source.js';
import { createStimulus } from '../../stimulus/create-stimulus.js';
import { findStrongestChannel } from '../../stimulus/marks/strongest-channel.js';
import { estimateTone } from '../../tone/estimate-tone.js';
import type { AnalysisContext } from '../measure.js';
import { shortNumber } from '../shared/settings-band.js';
import { followLevel, type LevelEnvelope } from '../shared/steps/follow-level.js';
import { matchLadder } from '../shared/steps/match-ladder.js';
import { recogniseSweep } from '../sweep/locate-sweep.js';
import type { SignalRecognition } from './signal-recognition.js';

/** A tone that keeps its level for so long stands on a step. */
const STEP_S = 0.22;
const SAME_STEP_DB = 0.12;
const OTHER_STEP_DB = 0.3;
const LEAST_STEPS = 5;
/** Steps that count lie above this against the loudest: below it noise moves the levels. */
const DEPTH_DB = 45;
const SHORTEST_S = 1;

const STEPPED = ['level-steps', 'modulation-steps', 'difference-steps'] as const;

/** Tells what changes with time in a known way: a tone in steps, two levels of a quarter of a rate, a sweep. */
export async function recogniseChange(
  source: SampleSource,
  context: Pick<AnalysisContext, 'signal'>,
): Promise<SignalRecognition | null> {
  if (source.frameCount < SHORTEST_S * source.sampleRateHz) return null;
  const envelope = await followLevel(source, null, context);
  const levels = envelope === null ? [] : stepLevels(envelope);
  if (envelope !== null && levels.length >= LEAST_STEPS) {
    for (const name of STEPPED) {
      if (matchLadder(envelope, ladderOf(name)) === null) continue;
      const hasTwo = name !== 'level-steps' || (await hasSecondTone(source, envelope));
      return {
        measure: hasTwo ? 'two-tone-steps' : 'level-steps',
        why: `it holds ${hasTwo ? 'two tones' : `a tone of ${shortNumber(envelope.frequencyHz)} Hz`} at ${levels.length} levels, one after the other`,
      };
    }
  }
  if (envelope !== null && levels.length >= 2 && levels.length <= 4) {
    if (isQuarter(envelope.frequencyHz) && matchLadder(envelope, ladderOf('intersample-tone')) !== null) {
      return {
        measure: 'intersample',
        why: `it holds a tone of ${shortNumber(envelope.frequencyHz)} Hz, a quarter of a usual rate, at two levels 6 dB apart`,
      };
    }
  }
  const sweep = await recogniseSweep(source, await findStrongestChannel(source), context);
  return sweep === null
    ? null
    : {
        measure: 'sweep',
        why: `it holds a tone that rises evenly in octaves, e-fold in ${shortNumber(Number(sweep.rateS.toPrecision(3)))} s`,
      };
}

const ladders = new Map<string, ReturnType<typeof makeLadder>>();

function ladderOf(name: string): ReturnType<typeof makeLadder> {
  const ladder = ladders.get(name) ?? makeLadder(name);
  ladders.set(name, ladder);
  return ladder;
}

function makeLadder(name: string) {
  return createStimulus(name, { sampleRateHz: 48_000, bitsPerSample: 24 }).describe('').parts[0].steps;
}

/** Levels that a tone keeps for a while, one after the other. */
function stepLevels({ levelsDb, blockS }: LevelEnvelope): number[] {
  const top = levelsDb.reduce((most, level) => Math.max(most, level), -Infinity);
  const steps: number[] = [];
  let from = 0;
  for (let k = 1; k <= levelsDb.length; k++) {
    if (k < levelsDb.length && Math.abs(levelsDb[k] - levelsDb[from]) <= SAME_STEP_DB) continue;
    const level = levelsDb[from];
    const isStep = (k - from) * blockS >= STEP_S && level > top - DEPTH_DB;
    if (isStep && (steps.length === 0 || Math.abs(level - steps[steps.length - 1]) > OTHER_STEP_DB)) {
      steps.push(level);
    }
    from = k;
  }
  return steps;
}

const LOOK_FRAMES = 16_384;
/** A second tone of a pair is no weaker than this against the first, power. */
const WEAKEST = 1e-2;

/** Whether another tone goes with the one that was followed: then what falls in steps is a pair. */
async function hasSecondTone(source: SampleSource, envelope: LevelEnvelope): Promise<boolean> {
  const loudest = envelope.levelsDb.indexOf(envelope.levelsDb.reduce((a, b) => Math.max(a, b), -Infinity));
  const from = Math.round((loudest + 3) * envelope.blockS * source.sampleRateHz);
  const channel = await findStrongestChannel(source);
  const samples = (await source.read(Math.min(from, source.frameCount), LOOK_FRAMES)).at(channel);
  if (samples === undefined || samples.length < 4096) return false;
  const hz = envelope.frequencyHz;
  const reach = Math.max(30, 0.05 * hz);
  const first = estimateTone(samples, source.sampleRateHz, { lowHz: hz - reach, highHz: hz + reach });
  const others = [
    estimateTone(samples, source.sampleRateHz, { lowHz: 20, highHz: hz - reach }),
    estimateTone(samples, source.sampleRateHz, { lowHz: hz + reach }),
  ];
  return others.some((other) => other !== null && first !== null && other.power > WEAKEST * first.power);
}

const USUAL_RATES_HZ = [44_100, 48_000, 88_200, 96_000, 176_400, 192_000];
const SAME_CLOCK = 3e-4;

function isQuarter(frequencyHz: number): boolean {
  return USUAL_RATES_HZ.some((rate) => Math.abs((4 * frequencyHz) / rate - 1) < SAME_CLOCK);
}
