import { Page, Section } from '@/components/page/page';
import { PageHead } from '@/components/page/page-head';
import { usePerson } from '@/lib/use-session';
import './account.css';
import { NameForm } from './name-form';
import { PasswordForm } from './password-form';
import { SessionsTable } from './sessions-table';
import { TokensSection } from './tokens-section';

/** What belongs to the person: name, password, open sessions, tokens for the command line. */
export function AccountPage() {
  const person = usePerson();
  return (
    <Page>
      <PageHead title="Your account" sub={`${person.email}, ${person.roles.join(', ')}`} />
      <div className="bl-account">
        <Section title="Name">
          <NameForm displayName={person.displayName} />
        </Section>
        <Section title="Password">
          <PasswordForm />
        </Section>
        <Section title="Where you are signed in" sub="End what you do not know.">
          <SessionsTable />
        </Section>
        <Section title="Tokens for the command line" sub="A token uploads in your name.">
          <TokensSection />
        </Section>
      </div>
    </Page>
  );
}
