import type { Finding } from '@benchlark/dsp';
import { describeFigure } from '@/lib/figures';
import type { ServedBody } from '../api/record-queries';

/** Where what a finding rests on can be seen: in which part of a programme, and which figure. */
export interface FindingPlace {
  /** 1, 2, 3 ... in a programme; null in the record itself. */
  readonly part: number | null;
  /** The figure's key, where a table shows the very value. */
  readonly figure: string | null;
}

/** Evidence is unrounded, the record's figures have nine digits. */
const SAME_SHARE = 1e-6;

/** Measures whose charts show a finding, the plainest first; for evidence that is read off a curve. */
const SHOWN_BY: Readonly<Record<string, readonly ServedBody['measure'][]>> = {
  'one-sided-clipping': ['level-steps', 'tone'],
  'symmetric-clipping': ['level-steps', 'tone'],
  'level-compression': ['level-steps'],
  'crossover-distortion': ['level-steps'],
  truncation: ['level-steps', 'dynamic-range'],
  'mains-hum': ['idle'],
  'frame-noise': ['idle'],
  jitter: ['jitter'],
  'image-products': ['filter', 'tone'],
  'early-roll-off': ['sweep'],
  'swapped-channels': ['separation'],
  'joined-channels': ['separation'],
  'channel-imbalance': ['separation'],
  'inverted-polarity': ['sweep', 'separation'],
  'dc-offset': ['idle', 'tone'],
  'recording-noise-limited': ['idle'],
  'intersample-overload': ['intersample'],
};

type Rests = Pick<Finding, 'code' | 'channel' | 'evidence'>;

function figureIn(body: ServedBody, { channel, evidence }: Rests): string | null {
  const places = body.channels.filter((one) => channel === null || one.channel === channel);
  for (const { value, unit } of evidence) {
    for (const { figures } of [...places, body.between]) {
      const found = Object.entries(figures).find(
        ([key, own]) =>
          typeof own === 'number' &&
          describeFigure(key).unit.startsWith(unit) &&
          Math.abs(own - value) <= SAME_SHARE * Math.abs(value),
      );
      if (found) return found[0];
    }
  }
  return null;
}

/** The body that shows what a finding rests on: by the very figure, else by the measure that such findings come from. */
export function placeOfFinding(record: ServedBody, finding: Rests): FindingPlace | null {
  const bodies = [
    { part: null, body: record },
    ...record.segments.map((body, index) => ({ part: index + 1, body })),
  ];
  for (const { part, body } of bodies) {
    const figure = figureIn(body, finding);
    if (figure !== null) return { part, figure };
  }
  for (const measure of SHOWN_BY[finding.code] ?? []) {
    const shown = bodies.find(({ part, body }) => part !== null && body.measure === measure);
    if (shown) return { part: shown.part, figure: null };
  }
  return null;
}
