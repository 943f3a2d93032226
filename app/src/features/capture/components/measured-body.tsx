import { ComponentsTable } from './components-table';
import { BetweenSection, FiguresSection } from './figures-section';
import { HarmonicsTable } from './harmonics-table';
import type { BodyView } from './measures/body-view';
import { MeasureView } from './measures/measure-view';
import { PartsTable } from './parts/parts-table';

/** Charts first, then figures and tables: what was measured, of a whole record or one part of a programme. */
export function MeasuredBody({ view }: { view: BodyView }) {
  const { body } = view;
  return (
    <>
      {body.segments.length > 0 && <PartsTable parts={body.segments} />}
      <MeasureView view={view} />
      <FiguresSection record={body} />
      <BetweenSection record={body} />
      <HarmonicsTable record={body} />
      <ComponentsTable record={body} />
    </>
  );
}
