import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { FormError } from '@/components/forms/field';
import { FailedState, LoadingState } from '@/components/states/states';
import { api, unwrap } from '@/lib/api-client';
import { errorWords } from '@/lib/error-words';
import { formatDateTime } from '@/lib/format/date';
import { peopleQueries } from '../api/people-queries';

/** Invitations that nobody has taken yet. */
export function InvitationsTable() {
  const queryClient = useQueryClient();
  const invitations = useQuery(peopleQueries.invitations());
  const revoke = useMutation({
    mutationFn: (id: string) => unwrap(api.DELETE('/api/invitations/{id}', { params: { path: { id } } })),
    onSettled: () => queryClient.invalidateQueries({ queryKey: peopleQueries.invitations().queryKey }),
  });
  if (invitations.isPending) return <LoadingState what="Fetching the invitations" />;
  if (invitations.isError) {
    return (
      <FailedState
        what="The invitations could not be fetched."
        why={errorWords(invitations.error)}
        onRetry={() => void invitations.refetch()}
      />
    );
  }
  if (invitations.data.items.length === 0) return <p className="bl-ink-2">None is open.</p>;
  return (
    <div className="bl-table-scroll" tabIndex={0} role="region" aria-label="Table of invitations">
      <table className="bl-table">
        <thead>
          <tr>
            <th scope="col">for</th>
            <th scope="col">as</th>
            <th scope="col">holds until</th>
            <th scope="col">
              <span className="bl-hidden">withdraw</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {invitations.data.items.map(({ id, email, roles, expiresAt }) => (
            <tr key={id}>
              <th scope="row">{email ?? 'whoever has the link'}</th>
              <td>{roles.join(', ')}</td>
              <td>{formatDateTime(expiresAt)}</td>
              <td>
                <button
                  type="button"
                  className="bl-word"
                  disabled={revoke.isPending}
                  aria-label={`Withdraw the invitation for ${email ?? 'whoever has the link'}`}
                  onClick={() => revoke.mutate(id)}
                >
                  Withdraw
                </button>
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      {revoke.error && <FormError>{errorWords(revoke.error)}</FormError>}
    </div>
  );
}
