import { Outlet, useLocation, useNavigate } from 'react-router-dom';
import { Shell } from '@/components/shell/shell';
import { SessionEnded } from '@/features/session/components/session-ended';
import { useSignOut } from '@/features/session/hooks/use-sign-out';
import { UploadsProvider, useUploadEntries } from '@/features/uploads/hooks/uploads-context';
import { isOnItsWay } from '@/features/uploads/model/upload-entry';
import { usePerson, useSession } from '@/lib/use-session';
import { useLiveEvents } from '../use-live-events';

/** Everything behind the sign-in: uploads and live events stand above the pages. */
export function Component() {
  return (
    <UploadsProvider>
      <Bench />
    </UploadsProvider>
  );
}

function Bench() {
  const person = usePerson();
  const { demo } = useSession();
  const signOut = useSignOut();
  const navigate = useNavigate();
  const { pathname, search } = useLocation();
  const onTheirWay = useUploadEntries().filter(isOnItsWay).length;
  useLiveEvents();
  return (
    <Shell
      person={person}
      notes={onTheirWay > 0 ? { '/archive': `${onTheirWay} arriving` } : {}}
      onSignOut={() => signOut.mutate()}
      onAddRecordings={() =>
        void navigate(
          { pathname: '/archive', search: pathname === '/archive' ? search : '' },
          { state: { add: true } },
        )
      }
    >
      <Outlet />
      <SessionEnded person={person} demo={demo} />
    </Shell>
  );
}
