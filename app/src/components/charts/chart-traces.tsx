import type { TraceModel } from './chart-model';

interface ChartTracesProps {
  traces: readonly TraceModel[];
  hiddenIds: ReadonlySet<string>;
  onToggle: (id: string) => void;
}

/** Which traces are shown; a hidden one keeps its colour and dash. */
export function ChartTraces({ traces, hiddenIds, onToggle }: ChartTracesProps) {
  return (
    <div className="bl-chart-traces" role="group" aria-label="Traces shown">
      <span aria-hidden="true">Show</span>
      {traces.map(({ id, name, kind, slot }) => (
        <label key={id} className={`bl-chart-${kind} bl-chart-slot-${slot}`}>
          <input type="checkbox" checked={!hiddenIds.has(id)} onChange={() => onToggle(id)} />
          {name}
        </label>
      ))}
    </div>
  );
}
