import { useQuery } from '@tanstack/react-query';
import { Navigate, Outlet, useLocation } from 'react-router-dom';
import { FailedState } from '@/components/states/states';
import { errorWords } from '@/lib/error-words';
import { sessionQueries } from '@/lib/queries/session';
import { LoadingPage } from './routes/loading-page';

/** Lets in who is signed in; the others go to the sign-in (or, on the first run, to the set-up) and come back after. */
export function SessionGate() {
  const session = useQuery(sessionQueries.current());
  const { pathname, search, hash } = useLocation();
  if (session.isPending) return <LoadingPage />;
  if (session.isError) return <NoSession error={session.error} onRetry={() => void session.refetch()} />;
  if (session.data.firstRun) return <Navigate to="/set-up" replace />;
  if (!session.data.person) {
    const here = pathname + search + hash;
    return <Navigate to={here === '/' ? '/sign-in' : `/sign-in?next=${encodeURIComponent(here)}`} replace />;
  }
  return <Outlet />;
}

/** For the pages before the bench: they need the session's facts, but nobody signed in. */
export function EntryGate() {
  const session = useQuery(sessionQueries.current());
  const { pathname } = useLocation();
  if (session.isPending) return <LoadingPage />;
  if (session.isError) return <NoSession error={session.error} onRetry={() => void session.refetch()} />;
  if (session.data.firstRun && pathname !== '/set-up') return <Navigate to="/set-up" replace />;
  return <Outlet />;
}

function NoSession({ error, onRetry }: { error: Error; onRetry: () => void }) {
  return (
    <main className="bl-page">
      <title>No answer · Benchlark</title>
      <FailedState what="The bench cannot be reached." why={errorWords(error)} onRetry={onRetry} />
    </main>
  );
}
