import { Button } from '@radix-ui/themes';
import { useQuery } from '@tanstack/react-query';
import { FormError, PasswordInput, TextInput } from '@/components/forms/field';
import { FailedState, LoadingState } from '@/components/states/states';
import { api, unwrap } from '@/lib/api-client';
import type { Session } from '@/lib/api-schema';
import type { components } from '@/lib/api-types';
import { errorWords } from '@/lib/error-words';
import { formatDateTime } from '@/lib/format/date';
import { useSessionForm } from '../hooks/use-session-form';
import { acceptSchema, PASSWORD_HELP } from '../model/session-forms';

type Invitation = components['schemas']['InvitationLookDto'];

/** What an invitation is for, and the form that takes it. */
export function AcceptInvitation({
  token,
  onSignedIn,
}: {
  token: string;
  onSignedIn: (session: Session) => void;
}) {
  const look = useQuery({
    queryKey: ['invitation', token],
    queryFn: ({ signal }) => unwrap(api.POST('/api/invitations/look', { body: { token }, signal })),
    retry: false,
    gcTime: 0,
  });
  if (look.isPending) return <LoadingState what="Looking at the invitation" />;
  if (look.isError) {
    return (
      <FailedState what="This invitation cannot be used." why={errorWords(look.error)}>
        <p>Ask whoever invited you for a new one.</p>
      </FailedState>
    );
  }
  return <AcceptForm token={token} invitation={look.data} onSignedIn={onSignedIn} />;
}

interface AcceptFormProps {
  token: string;
  invitation: Invitation;
  onSignedIn: (session: Session) => void;
}

function AcceptForm({ token, invitation, onSignedIn }: AcceptFormProps) {
  const { register, submit, formState, formError } = useSessionForm({
    schema: acceptSchema,
    defaults: { displayName: '', email: invitation.email ?? '', password: '' },
    fields: ['displayName', 'email', 'password'],
    send: async ({ displayName, email, password }) => {
      // Where the invitation names its address, that address counts and no other may be sent.
      const body = { token, displayName, password, ...(invitation.email === null ? { email } : {}) };
      onSignedIn(await unwrap(api.POST('/api/invitations/accept', { body })));
    },
  });
  const { errors, isSubmitting } = formState;
  return (
    <>
      <p className="bl-entry-aside">
        {invitation.invitedBy} invites you to {invitation.benchName} as {invitation.roles.join(' and ')}. The
        invitation holds until {formatDateTime(invitation.expiresAt)}.
      </p>
      <form noValidate onSubmit={(event) => void submit(event)}>
        <TextInput
          label="Your name"
          autoComplete="name"
          error={errors.displayName?.message}
          {...register('displayName')}
        />
        <TextInput
          label="Your e-mail"
          type="email"
          autoComplete="username"
          readOnly={invitation.email !== null}
          help={invitation.email === null ? undefined : 'The invitation is for this address.'}
          error={errors.email?.message}
          {...register('email')}
        />
        <PasswordInput
          label="Password"
          help={PASSWORD_HELP}
          autoComplete="new-password"
          error={errors.password?.message}
          {...register('password')}
        />
        {formError && <FormError>{formError}</FormError>}
        <Button type="submit" disabled={isSubmitting} aria-busy={isSubmitting}>
          {isSubmitting ? 'Joining' : 'Join the bench'}
        </Button>
      </form>
    </>
  );
}
