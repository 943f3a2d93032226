import { zodResolver } from '@hookform/resolvers/zod';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { SelectInput, TextAreaInput, TextInput } from '@/components/forms/field';
import { FormDialog } from '@/components/forms/form-dialog';
import { api, unwrap } from '@/lib/api-client';
import type { Unit } from '@/lib/api-schema';
import { placeErrors } from '@/lib/form-errors';
import { captureQueries } from '@/lib/queries/captures';
import { unitQueries } from '@/lib/queries/units';
import { KIND_OPTIONS, toNewUnit, toUnitChange, unitSchema } from '../model/unit-forms';
import type { UnitValues } from '../model/unit-forms';

export interface UnitDialogProps {
  /** The unit to change; a new one is put on the books when left out. */
  unit?: Unit;
  isOpen: boolean;
  onOpenChange: (isOpen: boolean) => void;
  onSaved: (unitId: string) => void;
}

export function UnitDialog({ unit, isOpen, onOpenChange, onSaved }: UnitDialogProps) {
  const queryClient = useQueryClient();
  const [formError, setFormError] = useState<string | null>(null);
  const { register, handleSubmit, setError, reset, formState } = useForm<UnitValues>({
    resolver: zodResolver(unitSchema),
    values: valuesOf(unit),
    resetOptions: { keepDirtyValues: true },
  });
  const save = useMutation({
    mutationFn: async (values: UnitValues) => {
      const saved = unit
        ? await unwrap(
            api.PATCH('/api/units/{id}', { params: { path: { id: unit.id } }, body: toUnitChange(values) }),
          )
        : await unwrap(api.POST('/api/units', { body: toNewUnit(values) }));
      return saved.id;
    },
    onSuccess: async (unitId) => {
      await Promise.all([
        queryClient.invalidateQueries({ queryKey: unitQueries.all() }),
        queryClient.invalidateQueries({ queryKey: captureQueries.all() }),
      ]);
      onOpenChange(false);
      reset();
      onSaved(unitId);
    },
    onError: (error) =>
      setFormError(
        placeErrors<UnitValues>(error, ['maker', 'model', 'serialNumber', 'kind', 'notes'], setError),
      ),
  });
  const { errors } = formState;
  return (
    <FormDialog
      isOpen={isOpen}
      onOpenChange={onOpenChange}
      title={unit ? 'Change the unit' : 'A new unit'}
      description="One physical device on the books. Another one of the same model is another unit."
      submitLabel={unit ? 'Keep the change' : 'Put it on the books'}
      isBusy={save.isPending}
      error={formError}
      onSubmit={(event) => {
        setFormError(null);
        void handleSubmit((values) => save.mutate(values))(event);
      }}
    >
      <TextInput label="Maker" error={errors.maker?.message} {...register('maker')} />
      <TextInput label="Model" error={errors.model?.message} {...register('model')} />
      <TextInput
        label="Serial number"
        help="As it stands on the device. Optional."
        error={errors.serialNumber?.message}
        {...register('serialNumber')}
      />
      <SelectInput label="Kind" options={KIND_OPTIONS} error={errors.kind?.message} {...register('kind')} />
      <TextAreaInput
        label="Notes"
        help="Where it is from, supply, options. Optional."
        error={errors.notes?.message}
        {...register('notes')}
      />
    </FormDialog>
  );
}

function valuesOf(unit: Unit | undefined): UnitValues {
  return {
    maker: unit?.maker ?? '',
    model: unit?.model ?? '',
    serialNumber: unit?.serialNumber ?? '',
    kind: unit?.kind ?? 'converter',
    notes: unit?.notes ?? '',
  };
}
