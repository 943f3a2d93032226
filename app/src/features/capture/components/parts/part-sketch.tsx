import { useQueries } from '@tanstack/react-query';
import { Sketch } from '@/components/figures/sketch';
import { PHONE_QUERY, useMedia } from '@/lib/use-media';
import { recordQueries } from '../../api/record-queries';
import type { ServedBody } from '../../api/record-queries';
import { useVisible } from '../../hooks/use-visible';
import { mainTraceOf, sketchShares } from '../../model/sketch-shares';

/** Longer traces are megabytes: one channel of them will do, and none on a phone. */
const LONG_POINTS = 20_000;
const MOST_CHANNELS = 2;
const nothing = () => undefined;

/** A thin drawing of a part's main trace, fetched when its row comes into view. */
export function PartSketch({ body }: { body: ServedBody }) {
  const { ref, isVisible } = useVisible<HTMLSpanElement>();
  const isPhone = useMedia(PHONE_QUERY);
  const name = mainTraceOf(body);
  const refs = [...body.channels, body.between].flatMap(({ traces }) => (name ? (traces[name] ?? []) : []));
  const isLong = refs.some(({ points }) => points > LONG_POINTS);
  const drawn = refs.slice(0, isLong ? 1 : MOST_CHANNELS);
  const traces = useQueries({
    queries: drawn.map((one) => ({
      ...recordQueries.trace(one, nothing),
      enabled: isVisible && !(isLong && isPhone),
    })),
  });
  const shares = traces.flatMap(({ data }) => (data && data.x.length > 0 ? [sketchShares(data)] : []));
  return (
    <span ref={ref} className="bl-part-sketch">
      {shares.length > 0 && <Sketch channels={shares} />}
    </span>
  );
}
