import { useParams } from 'react-router-dom';
import { UnitPage } from '@/features/units/components/unit-page';

export function Component() {
  const { unitId = '' } = useParams();
  return <UnitPage key={unitId} unitId={unitId} />;
}
