import { useParams } from 'react-router-dom';
import { RecordAddress } from '@/features/capture/components/record-address';

export function Component() {
  const { recordId = '' } = useParams();
  return <RecordAddress recordId={recordId} />;
}
