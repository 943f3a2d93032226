import { zodResolver } from '@hookform/resolvers/zod';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { TextAreaInput, TextInput } from '@/components/forms/field';
import { FormDialog } from '@/components/forms/form-dialog';
import { api, unwrap } from '@/lib/api-client';
import type { UnitCondition } from '@/lib/api-schema';
import { placeErrors } from '@/lib/form-errors';
import { captureQueries } from '@/lib/queries/captures';
import { unitQueries } from '@/lib/queries/units';
import { conditionSchema, toConditionChange, toNewCondition } from '../model/unit-forms';
import type { ConditionValues } from '../model/unit-forms';

export interface ConditionDialogProps {
  unitId: string;
  /** The condition to change; a new one when left out. */
  condition?: UnitCondition;
  isOpen: boolean;
  onOpenChange: (isOpen: boolean) => void;
}

export function ConditionDialog({ unitId, condition, isOpen, onOpenChange }: ConditionDialogProps) {
  const queryClient = useQueryClient();
  const [formError, setFormError] = useState<string | null>(null);
  const { register, handleSubmit, setError, reset, formState } = useForm<ConditionValues>({
    resolver: zodResolver(conditionSchema),
    defaultValues: {
      name: condition?.name ?? '',
      startedOn: condition?.startedOn?.slice(0, 10) ?? '',
      notes: condition?.notes ?? '',
    },
  });
  const save = useMutation({
    mutationFn: async (values: ConditionValues) => {
      if (condition) {
        const path = { id: condition.id };
        await unwrap(
          api.PATCH('/api/conditions/{id}', { params: { path }, body: toConditionChange(values) }),
        );
        return;
      }
      const path = { id: unitId };
      await unwrap(
        api.POST('/api/units/{id}/conditions', { params: { path }, body: toNewCondition(values) }),
      );
    },
    onSuccess: async () => {
      await Promise.all([
        queryClient.invalidateQueries({ queryKey: unitQueries.all() }),
        queryClient.invalidateQueries({ queryKey: captureQueries.all() }),
      ]);
      onOpenChange(false);
      reset();
    },
    onError: (error) =>
      setFormError(placeErrors<ConditionValues>(error, ['name', 'startedOn', 'notes'], setError)),
  });
  const { errors } = formState;
  return (
    <FormDialog
      isOpen={isOpen}
      onOpenChange={onOpenChange}
      title={condition ? 'Change the condition' : 'A new condition'}
      description="The state the unit is measured in: as received, after rework 1, firmware 2.1, on a linear supply."
      submitLabel={condition ? 'Keep the change' : 'Add it'}
      isBusy={save.isPending}
      error={formError}
      onSubmit={(event) => {
        setFormError(null);
        void handleSubmit((values) => save.mutate(values))(event);
      }}
    >
      <TextInput label="Name" error={errors.name?.message} {...register('name')} />
      <TextInput
        label="Since"
        type="date"
        help="Optional."
        error={errors.startedOn?.message}
        {...register('startedOn')}
      />
      <TextAreaInput
        label="Supply and settings"
        help="What would have to be the same to measure it again."
        error={errors.notes?.message}
        {...register('notes')}
      />
    </FormDialog>
  );
}
