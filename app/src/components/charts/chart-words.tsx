import { useState } from 'react';
import { formatCount } from '@/lib/format/quantity';
import type { ChartScene } from './draw-context';
import { axisName } from './draw-frame';
import { readAt, steppedTrace } from './readout';

const ROWS_A_PAGE = 50;

/** The chart in a sentence and as a table of its drawn points, a page at a time. */
export function ChartWords({ id, scene, inWords }: { id: string; scene: ChartScene; inWords: string }) {
  const [page, setPage] = useState(0);
  const xs = [...(steppedTrace(scene)?.points.x ?? [])].filter(
    (x) => x >= scene.view.xMin && x <= scene.view.xMax,
  );
  const pageCount = Math.max(1, Math.ceil(xs.length / ROWS_A_PAGE));
  const shownPage = Math.min(page, pageCount - 1);
  const readouts = xs
    .slice(shownPage * ROWS_A_PAGE, (shownPage + 1) * ROWS_A_PAGE)
    .map((x) => readAt(scene, x))
    .filter((readout) => readout !== null);
  return (
    <section id={id} className="bl-chart-words" aria-label="The chart in words">
      <p>{inWords}</p>
      <p className="bl-small bl-ink-2">
        {`The table gives the ${formatCount(xs.length)} points as drawn; the CSV export gives every one.`}
      </p>
      <div className="bl-table-scroll" role="region" aria-label="Table of the chart" tabIndex={0}>
        <table className="bl-table">
          <thead>
            <tr>
              <th scope="col">{axisName(scene.model.x)}</th>
              {scene.drawn.map(({ trace }) => (
                <th key={trace.id} scope="col" className="bl-table-number">
                  {axisName({ quantity: trace.name, unit: trace.unit ?? scene.model.y.unit })}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {readouts.map((readout) => (
              <tr key={readout.x}>
                <th scope="row">{readout.title}</th>
                {scene.drawn.map(({ trace }) => (
                  <td key={trace.id} className="bl-table-number bl-mono">
                    {readout.rows.find((row) => row.trace.id === trace.id)?.number}
                  </td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      {pageCount > 1 && (
        <p className="bl-chart-pages">
          <button
            type="button"
            className="bl-word"
            disabled={shownPage === 0}
            onClick={() => setPage(shownPage - 1)}
          >
            Earlier points
          </button>
          <span className="bl-small">{`${formatCount(shownPage + 1)} of ${formatCount(pageCount)}`}</span>
          <button
            type="button"
            className="bl-word"
            disabled={shownPage === pageCount - 1}
            onClick={() => setPage(shownPage + 1)}
          >
            Later points
          </button>
        </p>
      )}
    </section>
  );
}
