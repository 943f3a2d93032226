import { zodResolver } from '@hookform/resolvers/zod';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { TextAreaInput, TextInput } from '@/components/forms/field';
import { FormDialog } from '@/components/forms/form-dialog';
import { api, unwrap } from '@/lib/api-client';
import type { Rig } from '@/lib/api-schema';
import { placeErrors } from '@/lib/form-errors';
import { captureQueries } from '@/lib/queries/captures';
import { rigQueries } from '@/lib/queries/units';
import { rigFieldsOf, rigSchema } from '../model/rig-forms';
import type { RigFields, RigValues } from '../model/rig-forms';

export interface RigDialogProps {
  /** The rig to change; a new one is put on the books when left out. */
  rig?: Rig;
  isOpen: boolean;
  onOpenChange: (isOpen: boolean) => void;
  onSaved: (rigId: string) => void;
}

const FACTS = [
  ['interface', 'Interface', 'What records, with its inputs.'],
  ['source', 'Source', 'What plays: a computer, a stick, a disc.'],
  ['cables', 'Cables', undefined],
  ['supply', 'Supply', undefined],
  ['load', 'Load', 'What the unit’s output is loaded with.'],
] as const;

export function RigDialog({ rig, isOpen, onOpenChange, onSaved }: RigDialogProps) {
  const queryClient = useQueryClient();
  const [formError, setFormError] = useState<string | null>(null);
  const { register, handleSubmit, setError, reset, formState } = useForm<RigFields, unknown, RigValues>({
    resolver: zodResolver(rigSchema),
    values: rigFieldsOf(rig),
    resetOptions: { keepDirtyValues: true },
  });
  const save = useMutation({
    mutationFn: async (body: RigValues) => {
      const saved = rig
        ? await unwrap(api.PATCH('/api/rigs/{id}', { params: { path: { id: rig.id } }, body }))
        : await unwrap(api.POST('/api/rigs', { body }));
      return saved.id;
    },
    onSuccess: async (rigId) => {
      await Promise.all([
        queryClient.invalidateQueries({ queryKey: rigQueries.all() }),
        queryClient.invalidateQueries({ queryKey: captureQueries.all() }),
      ]);
      onOpenChange(false);
      reset();
      onSaved(rigId);
    },
    onError: (error) =>
      setFormError(
        placeErrors<RigFields>(
          error,
          ['name', 'interface', 'source', 'cables', 'supply', 'load', 'limitDbfs', 'notes'],
          setError,
        ),
      ),
  });
  const { errors } = formState;
  return (
    <FormDialog
      isOpen={isOpen}
      onOpenChange={onOpenChange}
      title={rig ? 'Change the rig' : 'A new rig'}
      description="The chain around the unit. What is not known can be left empty."
      submitLabel={rig ? 'Keep the change' : 'Put it on the books'}
      isBusy={save.isPending}
      error={formError}
      onSubmit={(event) => {
        setFormError(null);
        void handleSubmit((values) => save.mutate(values))(event);
      }}
    >
      <TextInput label="Name" error={errors.name?.message} {...register('name')} />
      {FACTS.map(([name, label, help]) => (
        <TextInput key={name} label={label} help={help} error={errors[name]?.message} {...register(name)} />
      ))}
      <TextInput
        label="Plays at most (dBFS)"
        inputMode="text"
        help="The highest level that may ever be played on it: what its load and what hangs on it can bear. Empty is full scale."
        error={errors.limitDbfs?.message}
        {...register('limitDbfs')}
      />
      <TextAreaInput label="Notes" error={errors.notes?.message} {...register('notes')} />
    </FormDialog>
  );
}
