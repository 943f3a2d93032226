import type { ChartScene } from './draw-context';
import type { Readout } from './readout';

/** The corner the cursor's box covers least: away from the cursor, where fewest points are drawn. */
function emptiestSide({ geometry, drawn, scales }: ChartScene, x: number): 'left' | 'right' {
  const middle = geometry.left + geometry.width / 2;
  const px = scales.x.toPx(x);
  // Close to one side only the other will do.
  if (px < geometry.left + geometry.width * 0.3) return 'right';
  if (px > geometry.left + geometry.width * 0.7) return 'left';
  const highest = (isLeft: boolean) => {
    let least = Infinity;
    for (const item of drawn) {
      item.px.forEach((at, index) => {
        if (at < middle === isLeft) least = Math.min(least, item.py[index] ?? Infinity);
      });
    }
    return least;
  };
  return highest(true) >= highest(false) ? 'left' : 'right';
}

/** The values under the cursor, in the emptier upper corner of the frame. */
export function ChartReadout({ scene, readout }: { scene: ChartScene; readout: Readout }) {
  const { left, top, width, totalWidth } = scene.geometry;
  const side = emptiestSide(scene, readout.x);
  const place = side === 'left' ? { left: left + 8 } : { right: totalWidth - left - width + 8 };
  return (
    <div className="bl-chart-readout" style={{ top: top + 8, ...place }} aria-hidden="true">
      <p className="bl-chart-readout-title">{readout.title}</p>
      <table>
        <tbody>
          {readout.rows.map(({ trace, number, unit }) => (
            <tr key={trace.id}>
              <th scope="row" className={`bl-chart-${trace.kind} bl-chart-slot-${trace.slot}`}>
                {trace.name}
              </th>
              <td>{number}</td>
              <td className="bl-chart-readout-unit">{unit}</td>
            </tr>
          ))}
        </tbody>
      </table>
      {readout.footnote && <p className="bl-chart-readout-note">{readout.footnote}</p>}
    </div>
  );
}
