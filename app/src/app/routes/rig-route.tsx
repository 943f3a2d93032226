import { useParams } from 'react-router-dom';
import { RigPage } from '@/features/rigs/components/rig-page';

export function Component() {
  const { rigId = '' } = useParams();
  return <RigPage key={rigId} rigId={rigId} />;
}
