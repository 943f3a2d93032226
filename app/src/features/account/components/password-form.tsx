import { Button } from '@radix-ui/themes';
import { zodResolver } from '@hookform/resolvers/zod';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { z } from 'zod';
import { FormError, PasswordInput } from '@/components/forms/field';
import { api, unwrap } from '@/lib/api-client';
import type { components } from '@/lib/api-types';
import { placeErrors } from '@/lib/form-errors';
import { accountQueries } from '../api/account-queries';

/** As the server has it: NIST SP 800-63B, 5.1.1.2. */
const LEAST_LENGTH = 8;

const passwordSchema = z.object({
  currentPassword: z.string().min(1, 'Type the password you have now'),
  newPassword: z
    .string()
    .min(LEAST_LENGTH, `At least ${LEAST_LENGTH} characters`)
    .max(128, 'At most 128 characters'),
}) satisfies z.ZodType<components['schemas']['ChangePasswordDto']>;

type PasswordValues = z.infer<typeof passwordSchema>;

export function PasswordForm() {
  const queryClient = useQueryClient();
  const [formError, setFormError] = useState<string | null>(null);
  const { register, handleSubmit, setError, reset, formState } = useForm<PasswordValues>({
    resolver: zodResolver(passwordSchema),
    defaultValues: { currentPassword: '', newPassword: '' },
  });
  const change = useMutation({
    mutationFn: (body: PasswordValues) => unwrap(api.POST('/api/me/password', { body })),
    onSuccess: () => {
      reset();
      void queryClient.invalidateQueries({ queryKey: accountQueries.all() });
    },
    onError: (error) =>
      setFormError(placeErrors<PasswordValues>(error, ['currentPassword', 'newPassword'], setError)),
  });
  const { errors } = formState;
  return (
    <form
      noValidate
      onSubmit={(event) => {
        setFormError(null);
        void handleSubmit((values) => change.mutate(values))(event);
      }}
    >
      <PasswordInput
        label="Password now"
        autoComplete="current-password"
        error={errors.currentPassword?.message}
        {...register('currentPassword')}
      />
      <PasswordInput
        label="New password"
        help={`At least ${LEAST_LENGTH} characters. The other sessions end when it is changed.`}
        autoComplete="new-password"
        error={errors.newPassword?.message}
        {...register('newPassword')}
      />
      {formError && <FormError>{formError}</FormError>}
      <p className="bl-account-act">
        <Button type="submit" variant="surface" color="gray" highContrast disabled={change.isPending}>
          Change the password
        </Button>
        <span role="status">{change.isSuccess ? 'Changed.' : ''}</span>
      </p>
    </form>
  );
}
