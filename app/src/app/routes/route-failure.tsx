import { isRouteErrorResponse, useRouteError } from 'react-router-dom';
import { Page } from '@/components/page/page';
import { FailedState } from '@/components/states/states';

/** What a person reads when a page itself breaks, or when its code can't be fetched after an update. */
export function PageFailure() {
  const error = useRouteError();
  const why = isRouteErrorResponse(error)
    ? `${error.status} ${error.statusText}`
    : error instanceof Error
      ? error.message
      : 'The reason is not known.';
  return (
    <Page>
      <title>Something went wrong · Benchlark</title>
      <h1 className="bl-page-title">This page could not be shown</h1>
      <FailedState
        what="The page stopped while it was being drawn."
        why={why}
        isRecordSafe
        onRetry={() => window.location.reload()}
      />
    </Page>
  );
}

/** The same where not even the shell stands around it. */
export function RouteFailure() {
  return (
    <main>
      <PageFailure />
    </main>
  );
}
