import type { ReactNode } from 'react';
import { NavLink } from 'react-router-dom';
import { Page } from '@/components/page/page';
import { PageHead } from '@/components/page/page-head';
import { useSession } from '@/lib/use-session';
import './people.css';

export interface PeopleFrameProps {
  title: string;
  sub: string;
  actions?: ReactNode;
  children: ReactNode;
}

/** The administrator's pages have one head and a row of words between them. */
export function PeopleFrame({ title, sub, actions, children }: PeopleFrameProps) {
  const { hasMailPage } = useSession();
  return (
    <Page>
      <PageHead title={title} sub={sub} actions={actions} />
      <nav aria-label="Administration" className="bl-people-nav">
        <NavLink to="/people" end>
          People
        </NavLink>
        <NavLink to="/people/audit">Audit trail</NavLink>
        <NavLink to="/people/jobs">Jobs and storage</NavLink>
        {hasMailPage && <NavLink to="/people/mail">Sent mail</NavLink>}
      </nav>
      {children}
    </Page>
  );
}
