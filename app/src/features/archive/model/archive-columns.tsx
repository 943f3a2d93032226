import {
  createColumnHelper,
  rowSelectionFeature,
  rowSortingFeature,
  tableFeatures,
} from '@tanstack/react-table';
import { Link } from 'react-router-dom';
import { MainFigure } from '@/components/captures/main-figure';
import { Sketch } from '@/components/figures/sketch';
import type { Capture } from '@/lib/api-schema';
import { STATE_WORDS, unitName, whatWasMeasured } from '@/lib/capture-words';
import { formatTime } from '@/lib/format/date';
import { formatCounted, formatPercent } from '@/lib/format/quantity';

/** Sorting, filtering and paging are the server's: the table only carries the order and the chosen rows. */
export const archiveFeatures = tableFeatures({ rowSortingFeature, rowSelectionFeature });

const column = createColumnHelper<typeof archiveFeatures, Capture>();

export const archiveColumns = column.columns([
  column.accessor('number', {
    header: 'capture',
    cell: ({ row: { original } }) => (
      <>
        <Link to={`/captures/${original.id}`} className="bl-mono">
          {original.number}
        </Link>
        <span className="bl-table-second">{formatTime(original.uploadedAt)}</span>
      </>
    ),
  }),
  column.display({
    id: 'drawing',
    header: 'drawing',
    cell: ({ row: { original } }) => (original.record ? <Sketch channels={original.record.sketch} /> : null),
  }),
  column.accessor((capture) => capture.record?.measure, {
    id: 'measure',
    header: 'what was measured',
    cell: ({ row: { original } }) => {
      const { title, detail } = whatWasMeasured(original);
      return (
        <>
          {title}
          <span className="bl-table-second">{detail}</span>
        </>
      );
    },
  }),
  column.accessor((capture) => capture.unit?.id, {
    id: 'unit',
    header: 'unit and condition',
    cell: ({ row: { original } }) => (
      <>
        {original.unit ? unitName(original.unit) : <span className="bl-ink-2">unsorted</span>}
        <span className="bl-table-second">{original.condition?.name}</span>
      </>
    ),
  }),
  column.display({ id: 'rig', header: 'rig', cell: ({ row: { original } }) => original.rig?.name }),
  column.display({
    id: 'figure',
    header: 'main figure',
    cell: ({ row: { original } }) =>
      original.record?.mainFigure ? <MainFigure main={original.record.mainFigure} /> : null,
  }),
  column.display({
    id: 'warnings',
    header: 'to note',
    cell: ({ row: { original } }) => <ToNote capture={original} />,
  }),
  column.display({
    id: 'record',
    header: 'record',
    cell: ({ row: { original } }) => (original.record ? `record ${original.record.ordinal}` : ''),
  }),
]);

/** Warnings, damage and what is not done yet, in words. */
export function ToNote({ capture }: { capture: Capture }) {
  if (capture.evidence !== 'sound') {
    return (
      <span className="bl-archive-fault">
        {capture.evidence === 'damaged' ? 'bytes differ' : 'bytes missing'}
      </span>
    );
  }
  if (capture.state === 'analysing' && capture.progress !== null) {
    return `being analysed, ${formatPercent(capture.progress)}`;
  }
  if (capture.state === 'failed') return <span className="bl-archive-fault">{STATE_WORDS.failed}</span>;
  if (capture.state !== 'done') return STATE_WORDS[capture.state];
  const count = (capture.record?.warningCount ?? 0) + capture.fileWarnings.length;
  return count === 0 ? null : formatCounted(count, 'warning');
}
