import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { FormError } from '@/components/forms/field';
import { FailedState, LoadingState } from '@/components/states/states';
import { api, unwrap } from '@/lib/api-client';
import { errorWords } from '@/lib/error-words';
import { formatDateTime } from '@/lib/format/date';
import { accountQueries } from '../api/account-queries';

/** The browsers that hold a session of this person. */
export function SessionsTable() {
  const queryClient = useQueryClient();
  const sessions = useQuery(accountQueries.sessions());
  const end = useMutation({
    mutationFn: (id: string) => unwrap(api.DELETE('/api/me/sessions/{id}', { params: { path: { id } } })),
    onSettled: () => queryClient.invalidateQueries({ queryKey: accountQueries.sessions().queryKey }),
  });
  if (sessions.isPending) return <LoadingState what="Fetching your sessions" />;
  if (sessions.isError) {
    return (
      <FailedState
        what="Your sessions could not be fetched."
        why={errorWords(sessions.error)}
        onRetry={() => void sessions.refetch()}
      />
    );
  }
  return (
    <div className="bl-table-scroll" tabIndex={0} role="region" aria-label="Table of sessions">
      <table className="bl-table">
        <thead>
          <tr>
            <th scope="col">browser</th>
            <th scope="col">since</th>
            <th scope="col">last seen</th>
            <th scope="col">
              <span className="bl-hidden">end</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {sessions.data.map(({ id, userAgent, createdAt, lastSeenAt, isCurrent }) => (
            <tr key={id}>
              <th scope="row" className="bl-account-agent">
                {browserWords(userAgent)}
              </th>
              <td>{formatDateTime(createdAt)}</td>
              <td>{isCurrent ? 'here, now' : formatDateTime(lastSeenAt)}</td>
              <td>
                {!isCurrent && (
                  <button
                    type="button"
                    className="bl-word"
                    disabled={end.isPending}
                    aria-label={`End the session of ${browserWords(userAgent)} since ${formatDateTime(createdAt)}`}
                    onClick={() => end.mutate(id)}
                  >
                    End it
                  </button>
                )}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      {end.error && <FormError>{errorWords(end.error)}</FormError>}
    </div>
  );
}

/** In this order: most browsers name others of the list besides themselves, for history's sake. */
const BROWSERS = ['Firefox', 'Edg', 'OPR', 'Chrome', 'Safari'] as const;
const SYSTEMS = ['Android', 'iPhone', 'iPad', 'Windows', 'Macintosh', 'Linux'] as const;

/** What a person knows it by; the whole of what a browser says of itself is long. */
function browserWords(userAgent: string): string {
  const browser = BROWSERS.find((name) => userAgent.includes(`${name}/`));
  const version = browser && new RegExp(`${browser}/(\\d+)`).exec(userAgent)?.[1];
  const system = SYSTEMS.find((name) => userAgent.includes(name));
  const parts = [[browser, version].filter(Boolean).join(' '), system].filter(Boolean);
  return parts.length > 0 ? parts.join(', ') : 'a browser that does not say what it is';
}
