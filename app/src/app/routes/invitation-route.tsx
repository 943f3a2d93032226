import { Link } from 'react-router-dom';
import { AcceptInvitation } from '@/features/session/components/accept-form';
import { EntryFrame } from '@/features/session/components/entry-frame';
import { useEnter } from '@/features/session/hooks/use-enter';
import { useHashToken } from '@/features/session/hooks/use-hash-token';

export function Component() {
  const token = useHashToken();
  const enter = useEnter('/');
  return (
    <EntryFrame title="Join the bench">
      {token === '' ? (
        <p>The link is not whole: open it from the letter again, or copy all of it.</p>
      ) : (
        <AcceptInvitation key={token} token={token} onSignedIn={enter} />
      )}
      <p>
        <Link to="/sign-in">I have an account</Link>
      </p>
    </EntryFrame>
  );
}
