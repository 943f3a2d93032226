import { Link } from 'react-router-dom';
import { PageHead } from '@/components/page/page-head';
import { Page } from '@/components/page/page';
import { NoRows } from '@/components/states/states';

export function Component() {
  return (
    <Page>
      <PageHead title="Nothing stands here" />
      <NoRows asked="This address leads to no page of the bench.">
        Go to <Link to="/">Today</Link> or to the <Link to="/archive">archive</Link>.
      </NoRows>
    </Page>
  );
}
