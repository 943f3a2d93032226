import type { Finding } from '../../record/record.js';
import { numberIn, pointsOf, type RecordView, type ViewedChannel } from '../record-view.js';
import { channelWord, makeFinding, proof, rounded } from '../words.js';
import { findBend, type Bend } from './bend.js';
import { heldHalfOfWave } from './held-wave.js';

/** A knee this near full scale is met by few recordings (common practice, no source). */
const HARMLESS_DBFS = -0.3;
/** Products that jump by so much above the knee belong to it, dB. */
const JUMP_DB = 12;
const CONFIRM_CLIPPING =
  'Play the same steps into another load and at another supply or volume setting: a knee that moves with them is the output stage’s. Swap the channels’ cables to rule out the recorder.';
const CONFIRM_COMPRESSION =
  'Repeat the steps after a longer warm-up and with a lighter load, and let one step last a minute: what changes with time or load is not in the digital part.';

/** An output that no longer follows near the top: from level steps, two tones and the wave together. */
export function clippingRule(view: RecordView): Finding[] {
  const fromSteps = view.channels('level-steps').flatMap((viewed): Finding[] => {
    if (view.isOverloaded(viewed.channel, ['level-steps'])) return [];
    const bend = findBend(viewed.result);
    return bend === null ? [] : [describe(view, viewed, bend)];
  });
  const told = new Set(view.channels('level-steps').map(({ channel }) => channel));
  return [...fromSteps, ...fromWave(view, told)];
}

function describe(view: RecordView, { channel, result }: ViewedChannel, bend: Bend): Finding {
  const { kind, fromDbfs, top } = bend;
  // Where the steps can't tell which half it is, the single tone may.
  const half = bend.half ?? (kind === 'one-sided' ? halfOfTone(view, channel) : null);
  const from = rounded(fromDbfs, kind === 'compression' ? 1 : 2);
  const name = channelWord(channel);
  const evidence = [
    proof(`deviation at ${rounded(top.x, 1)} dBFS`, top.y, 'dB'),
    ...residualProof(result, fromDbfs),
    ...productProof(view, channel, fromDbfs),
    ...waveProof(view, channel),
  ];
  const how = bend.isHard ? 'is cut off' : 'gives way';
  if (kind === 'compression') {
    return makeFinding({
      code: 'level-compression',
      severity: top.y < -0.5 ? 'fault' : 'caution',
      channel,
      fromStimulusDbfs: fromDbfs,
      summary: `${name} falls short more and more as the level rises: ${rounded(-top.y, 2)} dB at ${rounded(top.x, 1)} dBFS, without a knee.`,
      evidence,
      confirmBy: CONFIRM_COMPRESSION,
    });
  }
  const severity = fromDbfs < HARMLESS_DBFS ? 'fault' : 'caution';
  if (kind === 'symmetric') {
    return makeFinding({
      code: 'symmetric-clipping',
      severity,
      channel,
      fromStimulusDbfs: fromDbfs,
      summary: `${name} ${how} on both halves from ${from} dBFS up.`,
      evidence,
      confirmBy: CONFIRM_CLIPPING,
    });
  }
  return makeFinding({
    code: 'one-sided-clipping',
    severity,
    channel,
    half,
    fromStimulusDbfs: fromDbfs,
    summary: `${name} ${how} on ${half === null ? 'one' : `its ${half}`} half from ${from} dBFS up; the other half stays whole.`,
    evidence,
    confirmBy: CONFIRM_CLIPPING,
  });
}

/** How far the residual at the top stands above that below the knee. */
function residualProof(result: ViewedChannel['result'], kneeDbfs: number): Finding['evidence'] {
  const residual = pointsOf(result, 'residual');
  const below = residual.filter(({ x }) => x < kneeDbfs - 0.5 && x > kneeDbfs - 15).map(({ y }) => y);
  const top = residual.at(-1);
  if (top === undefined || below.length === 0) return [];
  below.sort((one, other) => one - other);
  const rise = top.y - below[below.length >> 1];
  return rise > JUMP_DB ? [proof('rise of the residual above the knee', rise, 'dB')] : [];
}

function halfOfTone(view: RecordView, channel: string): Finding['half'] {
  const tone = view.channels('tone').find((viewed) => viewed.channel === channel);
  return tone === undefined ? null : (heldHalfOfWave(tone.result)?.half ?? null);
}

/** The same crest held back in the single tone. */
function waveProof(view: RecordView, channel: string): Finding['evidence'] {
  return view
    .channels('tone')
    .filter((viewed) => viewed.channel === channel)
    .flatMap(({ result }) => {
      const held = heldHalfOfWave(result);
      return held === null ? [] : [proof('residual of the single tone', held.depthDb, 'dBr')];
    });
}

/** How far the products of two tones jump above the knee. */
function productProof(view: RecordView, channel: string, kneeDbfs: number): Finding['evidence'] {
  return view
    .channels('two-tone-steps')
    .filter((viewed) => viewed.channel === channel)
    .flatMap(({ result }) =>
      (['modulationDistortion', 'differenceD2', 'differenceD3'] as const).flatMap((name) => {
        const points = pointsOf(result, name);
        const above = points.filter(({ x }) => x > kneeDbfs + 0.2);
        const under = points.filter(({ x }) => x <= kneeDbfs && x > kneeDbfs - 15);
        if (above.length === 0) return [];
        const highest = Math.max(...above.map(({ y }) => y));
        const before = under.length === 0 ? highest - 2 * JUMP_DB : Math.max(...under.map(({ y }) => y));
        return highest - before > JUMP_DB ? [proof(`${WORDS[name]} above the knee`, highest, 'dB')] : [];
      }),
    );
}

const WORDS = {
  modulationDistortion: 'modulation distortion',
  differenceD2: 'difference product D2',
  differenceD3: 'difference product D3',
} as const;

/** A single tone with a flattened crest; used where no steps tell more. */
function fromWave(view: RecordView, told: ReadonlySet<string>): Finding[] {
  return view.channels('tone').flatMap(({ body, channel, result }): Finding[] => {
    if (told.has(channel) || view.isOverloaded(channel, ['tone'])) return [];
    const held = heldHalfOfWave(result);
    if (held === null) return [];
    const thd = numberIn(result.figures, 'thdDb') ?? held.depthDb;
    const level = playedLevel(
      body.reference.unitFullScaleDbfs,
      numberIn(result.figures, 'fundamentalLevelDbfs'),
    );
    const where = held.half === null ? 'on both halves' : `on its ${held.half} half`;
    return [
      makeFinding({
        code: held.half === null ? 'symmetric-clipping' : 'one-sided-clipping',
        severity: thd > -50 ? 'fault' : 'caution',
        channel,
        half: held.half,
        summary: `${channelWord(channel)} is held back ${where}${level === null ? '' : ` at ${rounded(level, 1)} dBFS`}: ${held.half === null ? 'odd' : 'even and odd'} harmonics stand at ${rounded(thd, 1)} dB in all.`,
        evidence: [proof('THD', thd, 'dB'), ...harmonicProof(result, 2), ...harmonicProof(result, 3)],
        confirmBy: `Play level steps: they tell from which level on. ${CONFIRM_CLIPPING}`,
      }),
    ];
  });
}

function playedLevel(fullScaleDbfs: number | null, levelDbfs: number | null): number | null {
  return fullScaleDbfs === null || levelDbfs === null ? null : levelDbfs - fullScaleDbfs;
}

function harmonicProof(result: ViewedChannel['result'], order: number): Finding['evidence'] {
  const level = result.harmonics.find((harmonic) => harmonic.order === order)?.levelDbr ?? null;
  return level === null ? [] : [proof(`harmonic ${order}`, level, 'dBr')];
}
