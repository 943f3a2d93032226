import { Link } from 'react-router-dom';
import { EntryFrame } from '@/features/session/components/entry-frame';
import { ResetForm } from '@/features/session/components/reset-forms';
import { useHashToken } from '@/features/session/hooks/use-hash-token';

export function Component() {
  const token = useHashToken();
  return (
    <EntryFrame title="Set a new password">
      {token === '' ? (
        <p>
          The link is not whole: open it from the letter again, or{' '}
          <Link to="/lost-password">ask for a new one</Link>.
        </p>
      ) : (
        <ResetForm key={token} token={token} />
      )}
    </EntryFrame>
  );
}
