import type { Finding } from '@benchlark/dsp';
import type { ServedBody } from '../api/record-queries';

/** Where a finding's evidence stands: in which part of a programme, and which figure. */
export interface FindingPlace {
  /** 1, 2, 3 ... in a programme; null in the record itself. */
  readonly part: number | null;
  /** The figure's key where a table shows it. */
  readonly figure: string | null;
}

/** Values of evidence are the record's own: a few units of the ninth digit apart at most. */
const SAME_SHARE = 1e-6;

function holds(
  body: ServedBody,
  { channel, evidence }: Pick<Finding, 'channel' | 'evidence'>,
): string | null {
  const places = body.channels.filter((one) => channel === null || one.channel === channel);
  const found = evidence.find(({ figure, value }) =>
    [...places, body.between].some(({ figures }) => {
      const own = figures[figure];
      return typeof own === 'number' && Math.abs(own - value) <= SAME_SHARE * Math.max(1, Math.abs(value));
    }),
  );
  return found?.figure ?? null;
}

/** The body that shows what a finding rests on: the record, or the first of its parts that has the very figure. */
export function placeOfFinding(
  record: ServedBody,
  finding: Pick<Finding, 'channel' | 'evidence'>,
): FindingPlace | null {
  const own = holds(record, finding);
  if (own !== null) return { part: null, figure: own };
  for (const [index, part] of record.segments.entries()) {
    const figure = holds(part, finding);
    if (figure !== null) return { part: index + 1, figure };
  }
  return null;
}
