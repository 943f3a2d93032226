import { Button } from '@radix-ui/themes';
import { useInfiniteQuery } from '@tanstack/react-query';
import { Link, useSearchParams } from 'react-router-dom';
import { TextInput } from '@/components/forms/field';
import { FailedState, LoadingState, NoRows } from '@/components/states/states';
import { errorWords } from '@/lib/error-words';
import { formatDateTime } from '@/lib/format/date';
import { auditQueries } from '../api/people-queries';
import { PeopleFrame } from './people-frame';

/** Who did what, when: nobody can change it. */
export function AuditPage() {
  const [params, setParams] = useSearchParams();
  const words = params.get('q') ?? '';
  const audit = useInfiniteQuery(auditQueries.list(words.trim()));
  const entries = audit.data?.pages.flatMap(({ items }) => items) ?? [];
  return (
    <PeopleFrame title="Audit trail" sub="Who did what, when. Lines are added and never changed.">
      <div className="bl-people-words">
        <TextInput
          label="Words"
          type="search"
          placeholder="person, action, subject"
          value={words}
          onChange={({ target }) =>
            setParams(target.value === '' ? {} : { q: target.value }, { replace: true })
          }
        />
      </div>
      {audit.isPending && <LoadingState what="Fetching the audit trail" />}
      {audit.isError && (
        <FailedState
          what="The audit trail could not be fetched."
          why={errorWords(audit.error)}
          onRetry={() => void audit.refetch()}
        />
      )}
      {audit.isSuccess && entries.length === 0 && (
        <NoRows asked="No line fits.">{words === '' ? 'Nothing was done yet.' : 'Take a word away.'}</NoRows>
      )}
      {entries.length > 0 && (
        <div className="bl-table-scroll" tabIndex={0} role="region" aria-label="Audit trail">
          <table className="bl-table bl-audit-table">
            <thead>
              <tr>
                <th scope="col">when</th>
                <th scope="col">who</th>
                <th scope="col">what</th>
                <th scope="col">about</th>
                <th scope="col">from</th>
              </tr>
            </thead>
            <tbody>
              {entries.map(({ id, at, actorName, action, subject, detail, ip }) => (
                <tr key={id}>
                  <td>
                    <time dateTime={at}>{formatDateTime(at)}</time>
                  </td>
                  <td>{actorName ?? 'the program'}</td>
                  <td>
                    <code>{action}</code>
                  </td>
                  <td>
                    <Subject subject={subject} />
                    <span className="bl-table-second">{detail}</span>
                  </td>
                  <td className="bl-mono">{ip}</td>
                </tr>
              ))}
            </tbody>
          </table>
        </div>
      )}
      {audit.hasNextPage && (
        <p className="bl-people-more">
          <Button
            variant="surface"
            color="gray"
            highContrast
            disabled={audit.isFetchingNextPage}
            onClick={() => void audit.fetchNextPage()}
          >
            {audit.isFetchingNextPage ? 'Fetching more' : 'Show more'}
          </Button>
        </p>
      )}
    </PeopleFrame>
  );
}

const SUBJECT_PAGES: Readonly<Record<string, string>> = {
  capture: '/captures/',
  record: '/records/',
  unit: '/units/',
};

/** The trail names its subjects "kind:id"; what has a page is linked. */
function Subject({ subject }: { subject: string | null }) {
  const [kind = '', id = ''] = subject?.split(':') ?? [];
  const page = SUBJECT_PAGES[kind];
  if (page && id) return <Link to={page + id}>this {kind}</Link>;
  return <>{subject}</>;
}
