import { Page } from '@/components/page/page';
import { LoadingState } from '@/components/states/states';

/** Shown while the first route's code is on its way. */
export function LoadingPage() {
  return (
    <Page>
      <LoadingState what="Opening the page" />
    </Page>
  );
}
