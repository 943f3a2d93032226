import { Page } from '@/components/page/page';
import { PageHead } from '@/components/page/page-head';
import { NoRows } from '@/components/states/states';
import { TodayPage } from '@/features/today/components/today-page';
import { formatLongDay } from '@/lib/format/date';
import { canReadArchive, usePerson, useSession } from '@/lib/use-session';

/** Today for those who work here; guests of the bench have nothing waiting yet. */
export function Component() {
  const person = usePerson();
  const { benchName } = useSession();
  if (canReadArchive(person)) return <TodayPage />;
  return (
    <Page>
      <PageHead title={formatLongDay(new Date())} titleAside={benchName} hasDivider />
      <NoRows asked="Nothing is shared with you yet.">
        You are here as {person.roles.join(', ')}. What the bench shares with you will stand here.
      </NoRows>
    </Page>
  );
}
