import { Button } from '@radix-ui/themes';
import { zodResolver } from '@hookform/resolvers/zod';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { z } from 'zod';
import { FormError, TextInput } from '@/components/forms/field';
import { api, unwrap } from '@/lib/api-client';
import type { components } from '@/lib/api-types';
import { placeErrors } from '@/lib/form-errors';
import { sessionQueries } from '@/lib/queries/session';

const nameSchema = z.object({
  displayName: z.string().trim().min(1, 'Say how the bench shall name you').max(80, 'At most 80 characters'),
}) satisfies z.ZodType<components['schemas']['UpdateMeDto']>;

type NameValues = z.infer<typeof nameSchema>;

export function NameForm({ displayName }: { displayName: string }) {
  const queryClient = useQueryClient();
  const [formError, setFormError] = useState<string | null>(null);
  const { register, handleSubmit, setError, formState } = useForm<NameValues>({
    resolver: zodResolver(nameSchema),
    values: { displayName },
  });
  const save = useMutation({
    mutationFn: (body: NameValues) => unwrap(api.PATCH('/api/me', { body })),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: sessionQueries.current().queryKey }),
    onError: (error) => setFormError(placeErrors<NameValues>(error, ['displayName'], setError)),
  });
  return (
    <form
      noValidate
      onSubmit={(event) => {
        setFormError(null);
        void handleSubmit((values) => save.mutate(values))(event);
      }}
    >
      <TextInput
        label="How the bench names you"
        autoComplete="name"
        error={formState.errors.displayName?.message}
        {...register('displayName')}
      />
      {formError && <FormError>{formError}</FormError>}
      <p className="bl-account-act">
        <Button
          type="submit"
          variant="surface"
          color="gray"
          highContrast
          disabled={save.isPending || !formState.isDirty}
        >
          Keep the name
        </Button>
        <span role="status">{save.isSuccess && !formState.isDirty ? 'Kept.' : ''}</span>
      </p>
    </form>
  );
}
