import { Navigate } from 'react-router-dom';
import { EntryFrame } from '@/features/session/components/entry-frame';
import { SetupForm } from '@/features/session/components/setup-form';
import { useEnter } from '@/features/session/hooks/use-enter';
import { useSession } from '@/lib/use-session';

export function Component() {
  const { firstRun } = useSession();
  const enter = useEnter('/');
  if (!firstRun) return <Navigate to="/" replace />;
  return (
    <EntryFrame title="Set up this bench">
      <SetupForm onSignedIn={enter} />
    </EntryFrame>
  );
}
