import { zodResolver } from '@hookform/resolvers/zod';
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useId, useState } from 'react';
import { useForm } from 'react-hook-form';
import { SelectInput, TextInput } from '@/components/forms/field';
import { FormDialog } from '@/components/forms/form-dialog';
import { api, unwrap } from '@/lib/api-client';
import type { Capture } from '@/lib/api-schema';
import { measureTitle } from '@/lib/capture-words';
import { errorWords } from '@/lib/error-words';
import { placeErrors } from '@/lib/form-errors';
import { formatDate } from '@/lib/format/date';
import { formatSampleRate } from '@/lib/format/quantity';
import { captureQueries } from '@/lib/queries/captures';
import { rigQueries } from '@/lib/queries/units';
import { baselineSchema } from '../model/rig-forms';
import type { BaselineValues } from '../model/rig-forms';

const OFFERED = 100;

export interface BaselineDialogProps {
  rigId: string;
  onClose: () => void;
}

/** Names one of the rig's captures without a unit as what the rig is by itself. */
export function BaselineDialog({ rigId, onClose }: BaselineDialogProps) {
  const queryClient = useQueryClient();
  const rangesId = useId();
  const [formError, setFormError] = useState<string | null>(null);
  const captures = useQuery(
    captureQueries.some({ rigId, unsorted: true, state: 'done', sort: 'uploadedAt', limit: OFFERED }),
  );
  const calibrations = useQuery(rigQueries.calibrations(rigId));
  const { register, handleSubmit, setError, formState } = useForm<BaselineValues>({
    resolver: zodResolver(baselineSchema),
    defaultValues: { captureId: '', inputRange: '' },
  });
  const save = useMutation({
    mutationFn: (body: BaselineValues) =>
      unwrap(api.POST('/api/rigs/{id}/baselines', { params: { path: { id: rigId } }, body })),
    onSuccess: async () => {
      await queryClient.invalidateQueries({ queryKey: rigQueries.all() });
      onClose();
    },
    onError: (error) =>
      setFormError(placeErrors<BaselineValues>(error, ['captureId', 'inputRange'], setError)),
  });
  const { errors } = formState;
  const ranges = (calibrations.data?.items ?? [])
    .filter(({ direction }) => direction === 'input')
    .map(({ range }) => range);
  return (
    <FormDialog
      isOpen
      onOpenChange={(isOpen) => {
        if (!isOpen) onClose();
      }}
      title="Name a baseline"
      description="The capture’s newest record becomes what the rig is by itself, and stays it when the capture is analysed again."
      submitLabel="Name it"
      isBusy={save.isPending}
      error={formError ?? (captures.isError ? errorWords(captures.error) : null)}
      onSubmit={(event) => {
        setFormError(null);
        void handleSubmit((values) => save.mutate(values))(event);
      }}
    >
      <SelectInput
        label="Capture"
        help="Of this rig, analysed, and filed under no unit."
        error={errors.captureId?.message}
        options={[
          { value: '', label: firstLabel(captures.data?.items) },
          ...(captures.data?.items ?? []).map((capture) => ({
            value: capture.id,
            label: captureLabel(capture),
          })),
        ]}
        {...register('captureId')}
      />
      <TextInput
        label="Range or gain of the input"
        help="Word for word as the calibration has it: a capture in another range is not held against it."
        list={rangesId}
        error={errors.inputRange?.message}
        {...register('inputRange')}
      />
      <datalist id={rangesId}>
        {[...new Set(ranges)].map((range) => (
          <option key={range} value={range} />
        ))}
      </datalist>
    </FormDialog>
  );
}

function firstLabel(captures: readonly Capture[] | undefined): string {
  if (!captures) return 'fetching the captures';
  return captures.length === 0 ? 'there is none to choose' : 'choose one';
}

function captureLabel({ number, record, sampleRateHz, uploadedAt, fileName }: Capture): string {
  const measure = record ? measureTitle(record.measure) : fileName;
  return `${number}, ${measure}, ${formatSampleRate(sampleRateHz)}, ${formatDate(uploadedAt)}`;
}
