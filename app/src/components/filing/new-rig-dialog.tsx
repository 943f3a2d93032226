import { zodResolver } from '@hookform/resolvers/zod';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { z } from 'zod';
import { TextAreaInput, TextInput } from '@/components/forms/field';
import { FormDialog } from '@/components/forms/form-dialog';
import { api, unwrap } from '@/lib/api-client';
import type { Rig } from '@/lib/api-schema';
import type { components } from '@/lib/api-types';
import { placeErrors } from '@/lib/form-errors';
import { rigQueries } from '@/lib/queries/units';

const rigSchema = z.object({
  name: z.string().trim().min(1, 'Give the rig a name').max(120, 'At most 120 characters'),
  notes: z.string().trim().max(4000, 'At most 4000 characters'),
}) satisfies z.ZodType<components['schemas']['CreateRigDto']>;

type RigValues = z.infer<typeof rigSchema>;

export interface NewRigDialogProps {
  isOpen: boolean;
  onOpenChange: (isOpen: boolean) => void;
  onMade: (rig: Rig) => void;
}

/** Puts a rig on the books by its name; what it consists of can be noted. */
export function NewRigDialog({ isOpen, onOpenChange, onMade }: NewRigDialogProps) {
  const queryClient = useQueryClient();
  const [formError, setFormError] = useState<string | null>(null);
  const { register, handleSubmit, setError, reset, formState } = useForm<RigValues>({
    resolver: zodResolver(rigSchema),
    defaultValues: { name: '', notes: '' },
  });
  const make = useMutation({
    mutationFn: (body: RigValues) => unwrap(api.POST('/api/rigs', { body })),
    onSuccess: async (rig) => {
      await queryClient.invalidateQueries({ queryKey: rigQueries.all() });
      onMade(rig);
      reset();
      onOpenChange(false);
    },
    onError: (error) => setFormError(placeErrors<RigValues>(error, ['name', 'notes'], setError)),
  });
  return (
    <FormDialog
      isOpen={isOpen}
      onOpenChange={onOpenChange}
      title="A new rig"
      description="The chain around the unit: source, interface, cables, supply, load."
      submitLabel="Put it on the books"
      isBusy={make.isPending}
      error={formError}
      onSubmit={(event) => {
        setFormError(null);
        void handleSubmit((values) => make.mutate(values))(event);
      }}
    >
      <TextInput label="Name" error={formState.errors.name?.message} {...register('name')} />
      <TextAreaInput
        label="What it consists of"
        help="Interface, cables, supply, load. Optional."
        error={formState.errors.notes?.message}
        {...register('notes')}
      />
    </FormDialog>
  );
}
