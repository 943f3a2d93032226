import type { FigureLimit } from '@benchlark/dsp';
import { Figure } from '@/components/figures/figure';
import type { RecordSummary } from '@/lib/api-schema';
import { channelName } from '@/lib/capture-words';
import { describeFigure } from '@/lib/figures';

type Main = NonNullable<RecordSummary['mainFigure']>;

/** The limit as a list row knows it: by what, and how far away. */
export function limitOfMain({ limitBy, marginDb }: Main): FigureLimit | null {
  if (limitBy === null) return null;
  return { by: limitBy as FigureLimit['by'], marginDb, floor: null, low: null, high: null, below: null };
}

/** The one figure of a record that a list shows, under its name, with what it is worth. */
export function MainFigure({ main }: { main: Main }) {
  return (
    <>
      <span className="bl-table-second">
        {describeFigure(main.key).label}, {channelName(main.channel)}
      </span>
      <Figure
        figureKey={main.key}
        value={main.value}
        limit={limitOfMain(main)}
        uncertaintyCh={0}
        integerCh={4}
        fractionCh={2}
        hasUnit
      />
    </>
  );
}
