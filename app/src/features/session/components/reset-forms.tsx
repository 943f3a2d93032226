import { Button } from '@radix-ui/themes';
import { useState } from 'react';
import { Link } from 'react-router-dom';
import { FormError, PasswordInput, TextInput } from '@/components/forms/field';
import { api, unwrap } from '@/lib/api-client';
import { useSessionForm } from '../hooks/use-session-form';
import { askResetSchema, PASSWORD_HELP, resetSchema } from '../model/session-forms';

/** Asks for a letter with a link. The answer is the same whether the address is known or not. */
export function AskResetForm() {
  const [sentTo, setSentTo] = useState<string | null>(null);
  const { register, submit, formState, formError } = useSessionForm({
    schema: askResetSchema,
    defaults: { email: '' },
    fields: ['email'],
    send: async (body) => {
      await unwrap(api.POST('/api/password-resets', { body }));
      setSentTo(body.email);
    },
  });
  if (sentTo !== null) {
    return (
      <p role="status">
        If {sentTo} belongs to somebody here, a letter with a link is on its way. The link works once, and not
        for long.
      </p>
    );
  }
  return (
    <form noValidate onSubmit={(event) => void submit(event)}>
      <TextInput
        label="E-mail"
        type="email"
        autoComplete="username"
        help="A link for a new password is sent to this address."
        error={formState.errors.email?.message}
        {...register('email')}
      />
      {formError && <FormError>{formError}</FormError>}
      <Button type="submit" disabled={formState.isSubmitting}>
        Send me a link
      </Button>
    </form>
  );
}

/** Sets a new password with the token from the letter. */
export function ResetForm({ token }: { token: string }) {
  const [isDone, setIsDone] = useState(false);
  const { register, submit, formState, formError } = useSessionForm({
    schema: resetSchema,
    defaults: { password: '' },
    fields: ['password'],
    send: async ({ password }) => {
      await unwrap(api.POST('/api/password-resets/complete', { body: { token, password } }));
      setIsDone(true);
    },
  });
  if (isDone) {
    return (
      <p role="status">
        The new password is set, and every session that was open has ended. <Link to="/sign-in">Sign in</Link>
      </p>
    );
  }
  return (
    <form noValidate onSubmit={(event) => void submit(event)}>
      <PasswordInput
        label="New password"
        help={PASSWORD_HELP}
        autoComplete="new-password"
        error={formState.errors.password?.message}
        {...register('password')}
      />
      {formError && (
        <FormError>
          {formError} <Link to="/lost-password">Ask for a new link</Link>
        </FormError>
      )}
      <Button type="submit" disabled={formState.isSubmitting}>
        Set this password
      </Button>
    </form>
  );
}
