import { useQuery } from '@tanstack/react-query';
import { FailedState, LoadingState, NoRows } from '@/components/states/states';
import { errorWords } from '@/lib/error-words';
import { formatDateTime } from '@/lib/format/date';
import { mailQueries } from '../api/people-queries';
import { PeopleFrame } from './people-frame';

/** While the bench is developed or shown, its letters go nowhere: they are read here. */
export function MailPage() {
  const mail = useQuery(mailQueries.list());
  return (
    <PeopleFrame title="Sent mail" sub="In this mode letters leave for nowhere: they are read here.">
      {mail.isPending && <LoadingState what="Fetching the letters" />}
      {mail.isError && (
        <FailedState
          what="The letters could not be fetched."
          why={errorWords(mail.error)}
          onRetry={() => void mail.refetch()}
        />
      )}
      {mail.data?.items.length === 0 && (
        <NoRows asked="No letter was sent yet.">Invite somebody to see one.</NoRows>
      )}
      <ul className="bl-mail-list">
        {mail.data?.items.map(({ id, at, to, subject, text }) => (
          <li key={id}>
            <details>
              <summary>
                <strong>{subject}</strong>{' '}
                <span className="bl-ink-2">
                  to {to}, {formatDateTime(at)}
                </span>
              </summary>
              <pre tabIndex={0}>{text}</pre>
            </details>
          </li>
        ))}
      </ul>
    </PeopleFrame>
  );
}
