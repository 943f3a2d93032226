import { useMemo } from 'react';
import type { Capture } from '@/lib/api-schema';
import type { ServedRecordDetail } from '../api/record-queries';
import { ComponentsTable } from './components-table';
import { FiguresSection } from './figures-section';
import { HarmonicsTable } from './harmonics-table';
import { RecordCharts } from './record-charts';
import { Waveform } from './waveform';

/** Everything that was measured: charts first, then figures, then the recording they are from. */
export function RecordView({ capture, detail }: { capture: Capture; detail: ServedRecordDetail }) {
  const { record } = detail;
  const channels = useMemo(() => record.channels.map(({ channel }) => channel), [record]);
  return (
    <>
      <RecordCharts capture={capture} detail={detail} />
      <FiguresSection record={record} />
      <HarmonicsTable record={record} />
      <ComponentsTable record={record} />
      <Waveform
        capture={capture}
        channels={channels}
        segment={{ fromS: record.settings.fromS, toS: record.settings.toS }}
      />
    </>
  );
}
