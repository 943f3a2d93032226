import { Button } from '@radix-ui/themes';
import { FormError, PasswordInput, TextInput } from '@/components/forms/field';
import { api, unwrap } from '@/lib/api-client';
import type { Session } from '@/lib/api-schema';
import { useSessionForm } from '../hooks/use-session-form';
import { PASSWORD_HELP, setupSchema } from '../model/session-forms';

/** First run: whoever can read the server's terminal names the bench and becomes its first administrator. */
export function SetupForm({ onSignedIn }: { onSignedIn: (session: Session) => void }) {
  const { register, submit, formState, formError } = useSessionForm({
    schema: setupSchema,
    defaults: { secret: '', benchName: '', displayName: '', email: '', password: '' },
    fields: ['secret', 'benchName', 'displayName', 'email', 'password'],
    send: async (body) => onSignedIn(await unwrap(api.POST('/api/setup', { body }))),
  });
  const { errors, isSubmitting } = formState;
  return (
    <>
      <p className="bl-entry-aside">
        Nobody has an account here yet. You become its first administrator, reviewer and technician; others
        are invited later.
      </p>
      <form noValidate onSubmit={(event) => void submit(event)}>
        <TextInput
          label="One-time secret"
          help="The server printed it when it started."
          autoComplete="off"
          spellCheck={false}
          error={errors.secret?.message}
          {...register('secret')}
        />
        <TextInput label="Name of the bench" error={errors.benchName?.message} {...register('benchName')} />
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
          {isSubmitting ? 'Setting up' : 'Set up the bench'}
        </Button>
      </form>
    </>
  );
}
