import { useParams, useSearchParams } from 'react-router-dom';
import { CapturePage } from '@/features/capture/components/capture-page';
import { readPart } from '@/features/capture/model/part-address';

export function Component() {
  const { captureId = '' } = useParams();
  const [params] = useSearchParams();
  return (
    <CapturePage
      key={captureId}
      captureId={captureId}
      recordId={params.get('record')}
      part={readPart(params)}
    />
  );
}
