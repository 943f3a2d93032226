import { Button } from '@radix-ui/themes';
import { FormError, PasswordInput, TextInput } from '@/components/forms/field';
import { api, unwrap } from '@/lib/api-client';
import type { Session } from '@/lib/api-schema';
import { useSessionForm } from '../hooks/use-session-form';
import { signInSchema } from '../model/session-forms';

export interface SignInFormProps {
  demo: Session['demo'];
  /** Filled in where it is known who was signed in. */
  email?: string;
  onSignedIn: (session: Session) => void;
}

/** E-mail and password. In a demonstration the invented people's accounts stand below and are filled in by one press. */
export function SignInForm({ demo, email = '', onSignedIn }: SignInFormProps) {
  const { register, submit, formState, formError, setValue, setFocus } = useSessionForm({
    schema: signInSchema,
    defaults: { email, password: '' },
    fields: ['email', 'password'],
    send: async (body) => onSignedIn(await unwrap(api.POST('/api/session', { body }))),
  });
  const { errors, isSubmitting } = formState;
  return (
    <>
      <form noValidate onSubmit={(event) => void submit(event)}>
        <TextInput
          label="E-mail"
          type="email"
          autoComplete="username"
          error={errors.email?.message}
          {...register('email')}
        />
        <PasswordInput
          label="Password"
          autoComplete="current-password"
          error={errors.password?.message}
          {...register('password')}
        />
        {formError && <FormError>{formError}</FormError>}
        <Button type="submit" disabled={isSubmitting} aria-busy={isSubmitting}>
          {isSubmitting ? 'Signing in' : 'Sign in'}
        </Button>
      </form>
      {demo && (
        <section className="bl-demo-accounts" aria-labelledby="demo-title">
          <h2 id="demo-title">A demonstration</h2>
          <p className="bl-entry-aside">
            Its people and their devices are invented. Take one of their places:
          </p>
          <ul>
            {demo.accounts.map((account) => (
              <li key={account.email}>
                <span>
                  {account.displayName} <span className="bl-ink-2 bl-small">{account.roles.join(', ')}</span>
                </span>
                <button
                  type="button"
                  className="bl-word"
                  aria-label={`Fill in as ${account.displayName}`}
                  onClick={() => {
                    setValue('email', account.email, { shouldValidate: true });
                    setValue('password', account.password, { shouldValidate: true });
                    setFocus('password');
                  }}
                >
                  Fill in
                </button>
              </li>
            ))}
          </ul>
        </section>
      )}
    </>
  );
}
