import { Button } from '@radix-ui/themes';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useSearchParams } from 'react-router-dom';
import { TextInput } from '@/components/forms/field';
import { Section } from '@/components/page/page';
import { FailedState, LoadingState, NoRows } from '@/components/states/states';
import { errorWords } from '@/lib/error-words';
import { peopleQueries } from '../api/people-queries';
import { InvitationsTable } from './invitations-table';
import { InviteDialog } from './invite-dialog';
import { PeopleFrame } from './people-frame';
import { PersonRow } from './person-row';

/** Who belongs to the bench, and who is invited. */
export function PeoplePage() {
  const [params, setParams] = useSearchParams();
  const words = params.get('q') ?? '';
  const people = useQuery(peopleQueries.list(words.trim()));
  const [isInviting, setIsInviting] = useState(false);
  return (
    <PeopleFrame
      title="People and audit"
      sub="A person may hold several roles; the limits are the role's."
      actions={<Button onClick={() => setIsInviting(true)}>Invite somebody</Button>}
    >
      <div className="bl-people-words">
        <TextInput
          label="Words"
          type="search"
          placeholder="name, e-mail"
          value={words}
          onChange={({ target }) =>
            setParams(target.value === '' ? {} : { q: target.value }, { replace: true })
          }
        />
      </div>
      {people.isPending && <LoadingState what="Fetching the people" />}
      {people.isError && (
        <FailedState
          what="The people could not be fetched."
          why={errorWords(people.error)}
          onRetry={() => void people.refetch()}
        />
      )}
      {people.data?.items.length === 0 && (
        <NoRows asked={`Nobody fits “${words}”.`}>Take a word away.</NoRows>
      )}
      {people.data && people.data.items.length > 0 && (
        <div className="bl-table-scroll" tabIndex={0} role="region" aria-label="People">
          <table className="bl-table bl-people-table">
            <thead>
              <tr>
                <th scope="col">person</th>
                <th scope="col">roles</th>
                <th scope="col">last seen</th>
                <th scope="col">
                  <span className="bl-hidden">what can be done</span>
                </th>
              </tr>
            </thead>
            <tbody>
              {people.data.items.map((person) => (
                <PersonRow key={person.id} person={person} />
              ))}
            </tbody>
          </table>
        </div>
      )}
      <Section title="Invitations">
        <InvitationsTable />
      </Section>
      <InviteDialog isOpen={isInviting} onOpenChange={setIsInviting} />
    </PeopleFrame>
  );
}
