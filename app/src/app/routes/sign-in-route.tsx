import { Link, Navigate, useLocation, useSearchParams } from 'react-router-dom';
import { EntryFrame } from '@/features/session/components/entry-frame';
import { SignInForm } from '@/features/session/components/sign-in-form';
import { useEnter } from '@/features/session/hooks/use-enter';
import { nextPath } from '@/features/session/model/next-path';
import { useSession } from '@/lib/use-session';

export function Component() {
  const { person, demo } = useSession();
  const [params] = useSearchParams();
  const to = nextPath(params.get('next'));
  const enter = useEnter(to);
  const state = useLocation().state as { hasSignedOut?: boolean } | null;
  if (person) return <Navigate to={to} replace />;
  return (
    <EntryFrame title="Sign in to the bench">
      {state?.hasSignedOut && <p role="status">You are signed out.</p>}
      <SignInForm demo={demo} onSignedIn={enter} />
      <p>
        <Link to="/lost-password">I have lost my password</Link>
      </p>
      <p className="bl-entry-aside">
        Benchlark is by invitation. If a bench invited you, use the link in its letter.
      </p>
    </EntryFrame>
  );
}
