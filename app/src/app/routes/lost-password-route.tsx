import { Link } from 'react-router-dom';
import { EntryFrame } from '@/features/session/components/entry-frame';
import { AskResetForm } from '@/features/session/components/reset-forms';

export function Component() {
  return (
    <EntryFrame title="A new password">
      <AskResetForm />
      <p>
        <Link to="/sign-in">Back to the sign-in</Link>
      </p>
    </EntryFrame>
  );
}
