import { useSearchParams } from 'react-router-dom';
import { LocalRecord } from '@/features/capture/components/local-record';
import { readPart } from '@/features/capture/model/part-address';
import { LivePage } from '@/features/live/components/live-page';
import type { LocalTake } from '@/features/live/model/take';

/** The bench; a take is drawn as the archive will draw it. */
export function Component() {
  return <LivePage renderTake={(take) => <TakeRecord take={take} />} />;
}

function TakeRecord({ take }: { take: LocalTake }) {
  const [params] = useSearchParams();
  if (!take.record) return null;
  return (
    <LocalRecord
      id={take.id}
      record={take.record}
      subject={{ fileName: take.fileName, unit: null, condition: null, rig: null, number: null }}
      madeAt={take.madeAt}
      part={readPart(params)}
    />
  );
}
