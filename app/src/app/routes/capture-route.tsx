import { useParams, useSearchParams } from 'react-router-dom';
import { CapturePage } from '@/features/capture/components/capture-page';

export function Component() {
  const { captureId = '' } = useParams();
  const [params] = useSearchParams();
  return <CapturePage key={captureId} captureId={captureId} recordId={params.get('record')} />;
}
