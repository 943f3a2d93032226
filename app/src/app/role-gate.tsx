import { Link, Outlet } from 'react-router-dom';
import { Page } from '@/components/page/page';
import { PageHead } from '@/components/page/page-head';
import type { Role } from '@/lib/api-schema';
import { hasRole, usePerson } from '@/lib/use-session';

/** Shows a page to those whose role it is, and says so to the others. The server decides by itself all the same. */
export function RoleGate({ roles }: { roles: readonly Role[] }) {
  const person = usePerson();
  if (hasRole(person, ...roles)) return <Outlet />;
  return (
    <Page>
      <PageHead
        title="Not open to you"
        sub={`This page is for the ${roles.join(' or ')}. You are here as ${person.roles.join(', ')}.`}
      />
      <p className="bl-below-head">
        An administrator can change that. <Link to="/">To Today</Link>
      </p>
    </Page>
  );
}
