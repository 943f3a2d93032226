import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { ConfirmDialog } from '@/components/forms/confirm-dialog';
import { CheckboxInput, FormError } from '@/components/forms/field';
import { api, unwrap } from '@/lib/api-client';
import type { Person, Role } from '@/lib/api-schema';
import type { components } from '@/lib/api-types';
import { ROLE_WORDS } from '@/lib/capture-words';
import { errorWords } from '@/lib/error-words';
import { formatDateTime } from '@/lib/format/date';
import { usePerson } from '@/lib/use-session';
import { peopleQueries } from '../api/people-queries';

export const ROLES = Object.keys(ROLE_WORDS) as Role[];

/** One person: their roles to tick, and what can be done about their account. */
export function PersonRow({ person }: { person: Person }) {
  const queryClient = useQueryClient();
  const isMe = usePerson().id === person.id;
  const [isAsking, setIsAsking] = useState(false);
  const change = useMutation({
    mutationFn: (body: components['schemas']['UpdatePersonDto']) =>
      unwrap(api.PATCH('/api/people/{id}', { params: { path: { id: person.id } }, body })),
    onSuccess: () => setIsAsking(false),
    onSettled: () => queryClient.invalidateQueries({ queryKey: peopleQueries.all() }),
  });
  const reset = useMutation({
    mutationFn: () =>
      unwrap(api.POST('/api/people/{id}/password-reset', { params: { path: { id: person.id } } })),
  });
  const setRole = (role: Role, isHeld: boolean) =>
    change.mutate({ roles: isHeld ? [...person.roles, role] : person.roles.filter((held) => held !== role) });
  return (
    <tr>
      <th scope="row">
        {person.displayName}
        <span className="bl-table-second">
          {person.email}
          {person.isDisabled && ', disabled'}
        </span>
      </th>
      <td>
        <fieldset className="bl-people-roles" disabled={change.isPending}>
          <legend className="bl-hidden">Roles of {person.displayName}</legend>
          {ROLES.map((role) => (
            <CheckboxInput
              key={role}
              label={ROLE_WORDS[role]}
              checked={person.roles.includes(role)}
              // Whoever takes the last administrator's role away locks the bench: the server refuses it, and so does this.
              disabled={isMe && role === 'administrator'}
              onChange={({ target }) => setRole(role, target.checked)}
            />
          ))}
        </fieldset>
        {change.error && !isAsking && <FormError>{errorWords(change.error)}</FormError>}
      </td>
      <td>{person.lastSeenAt ? formatDateTime(person.lastSeenAt) : 'never'}</td>
      <td>
        <p className="bl-people-acts">
          <button
            type="button"
            className="bl-word"
            disabled={reset.isPending || person.isDisabled}
            aria-label={`Send ${person.displayName} a link for a new password`}
            onClick={() => reset.mutate()}
          >
            Send a password link
          </button>
          {!isMe && (
            <button
              type="button"
              className="bl-word"
              aria-label={`${person.isDisabled ? 'Let' : 'Disable'} ${person.displayName}${person.isDisabled ? ' in again' : ''}`}
              onClick={() => (person.isDisabled ? change.mutate({ isDisabled: false }) : setIsAsking(true))}
            >
              {person.isDisabled ? 'Let in again' : 'Disable'}
            </button>
          )}
        </p>
        <p role="status" className="bl-small">
          {reset.isSuccess && 'A letter is on its way.'}
          {reset.error && errorWords(reset.error)}
        </p>
        <ConfirmDialog
          isOpen={isAsking}
          onOpenChange={setIsAsking}
          title={`Disable ${person.displayName}`}
          confirmLabel="Disable"
          isDestructive
          isBusy={change.isPending}
          error={change.error ? errorWords(change.error) : null}
          onConfirm={() => change.mutate({ isDisabled: true })}
        >
          They are signed out everywhere and their tokens are refused. What they did stays in the archive and
          in the audit trail. They can be let in again.
        </ConfirmDialog>
      </td>
    </tr>
  );
}
