import { zodResolver } from '@hookform/resolvers/zod';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useForm, useWatch } from 'react-hook-form';
import { SelectInput, TextAreaInput, TextInput } from '@/components/forms/field';
import { FormDialog } from '@/components/forms/form-dialog';
import { WarningBlock } from '@/components/page/page';
import { api, unwrap } from '@/lib/api-client';
import { placeErrors } from '@/lib/form-errors';
import { rigQueries } from '@/lib/queries/units';
import { fullScaleSentence, toNewCalibration } from '../model/full-scale';
import { calibrationSchema } from '../model/rig-forms';
import type { CalibrationFields, CalibrationValues } from '../model/rig-forms';

const DIRECTIONS = [
  { value: 'input', label: 'an input: what is recorded' },
  { value: 'output', label: 'an output: what is played' },
];
const CHANNELS = [
  { value: 'all', label: 'both channels alike' },
  { value: 'left', label: 'left alone' },
  { value: 'right', label: 'right alone' },
];
const FIELDS = [
  ...['direction', 'channel', 'range', 'sampleRateHz', 'frequencyHz', 'dividerRatio', 'loadOhm'],
  ...['meter', 'meterUncertaintyPercent', 'takenOn', 'validUntil', 'notes'],
] as (keyof CalibrationFields)[];

export interface CalibrationDialogProps {
  rigId: string;
  onClose: () => void;
}

/** Enters what was read at a meter; the sum to full scale is done and shown. */
export function CalibrationDialog({ rigId, onClose }: CalibrationDialogProps) {
  const queryClient = useQueryClient();
  const [formError, setFormError] = useState<string | null>(null);
  const { register, handleSubmit, setError, control, formState } = useForm<
    CalibrationFields,
    unknown,
    CalibrationValues
  >({ resolver: zodResolver(calibrationSchema), defaultValues: newCalibration(new Date()) });
  const [direction, meterVrms, levelDbfs, dividerRatio] = useWatch({
    control,
    name: ['direction', 'meterVrms', 'levelDbfs', 'dividerRatio'],
  });
  const save = useMutation({
    mutationFn: (values: CalibrationValues) =>
      unwrap(
        api.POST('/api/rigs/{id}/calibrations', {
          params: { path: { id: rigId } },
          body: toNewCalibration(values),
        }),
      ),
    onSuccess: async () => {
      await queryClient.invalidateQueries({ queryKey: rigQueries.all() });
      onClose();
    },
    onError: (error) => setFormError(placeErrors<CalibrationFields>(error, FIELDS, setError)),
  });
  const { errors } = formState;
  const text = (name: keyof CalibrationFields, label: string, help?: string) => (
    <TextInput label={label} help={help} error={errors[name]?.message} {...register(name)} />
  );
  const number = (name: keyof CalibrationFields, label: string, help?: string) => (
    <TextInput
      label={label}
      help={help}
      inputMode="decimal"
      error={errors[name]?.message}
      {...register(name)}
    />
  );
  return (
    <FormDialog
      isOpen
      onOpenChange={(isOpen) => {
        if (!isOpen) onClose();
      }}
      title="A new calibration"
      description="Volts at digital full scale. Once entered it is never changed: a newer one follows it."
      submitLabel="Enter it for good"
      isBusy={save.isPending}
      error={formError}
      onSubmit={(event) => {
        setFormError(null);
        void handleSubmit((values) => save.mutate(values))(event);
      }}
    >
      <div className="bl-calibration-caution">
        <WarningBlock lead="The terminals are live while you measure.">
          Take loudspeakers and headphones off, begin quietly, and use a meter and leads made for the voltage.
          A power amplifier’s terminals can be dangerous to touch, and not every one may be joined to earth:
          leave those, and everything connected to the mains, to qualified people. Local codes come first.
        </WarningBlock>
      </div>
      <SelectInput label="Of" options={DIRECTIONS} {...register('direction')} />
      <SelectInput label="Channel" options={CHANNELS} {...register('channel')} />
      {text('range', 'Range or gain', 'As it stands on the interface: pad off, gain at 0.')}
      <div className="bl-calibration-pair">
        {number('sampleRateHz', 'Sample rate (Hz)')}
        {number('frequencyHz', 'Tone (Hz)')}
      </div>
      <div className="bl-calibration-pair">
        {number('meterVrms', 'Meter reads (V RMS)', 'At the interface’s own terminals.')}
        {direction === 'output'
          ? text('levelDbfs', 'While playing (dBFS)', 'The sine’s level, full scale is 0.')
          : text('levelDbfs', 'Recording shows (dBFS)', 'The sine’s level, full scale is 0.')}
      </div>
      <div className="bl-calibration-pair">
        {number('dividerRatio', 'Divider', 'Between unit and interface. 1 is none.')}
        {number('loadOhm', 'Load (ohm)', 'Optional.')}
      </div>
      <p className="bl-calibration-sum" aria-live="polite">
        {fullScaleSentence({ direction, meterVrms, levelDbfs, dividerRatio }) ??
          'The sum to full scale stands here once meter, level and divider are filled in.'}
      </p>
      {text('meter', 'Meter', 'Which one, so that it can be found again.')}
      {number(
        'meterUncertaintyPercent',
        'Uncertainty (%)',
        'Of meter and divider together, expanded, k = 2.',
      )}
      <div className="bl-calibration-pair">
        <TextInput label="Taken on" type="date" error={errors.takenOn?.message} {...register('takenOn')} />
        <TextInput
          label="Valid until"
          type="date"
          error={errors.validUntil?.message}
          {...register('validUntil')}
        />
      </div>
      <TextAreaInput label="Notes" help="Optional." error={errors.notes?.message} {...register('notes')} />
    </FormDialog>
  );
}

function newCalibration(now: Date): CalibrationFields {
  const nextYear = new Date(now.getFullYear() + 1, now.getMonth(), now.getDate());
  return {
    direction: 'input',
    channel: 'all',
    range: '',
    sampleRateHz: '48000',
    frequencyHz: '997',
    meterVrms: '',
    levelDbfs: '0',
    dividerRatio: '1',
    loadOhm: '',
    meter: '',
    meterUncertaintyPercent: '',
    takenOn: dayOf(now),
    validUntil: dayOf(nextYear),
    notes: '',
  };
}

/** The day on the reader's own wall, YYYY-MM-DD. */
function dayOf(date: Date): string {
  const two = (part: number) => String(part).padStart(2, '0');
  return `${date.getFullYear()}-${two(date.getMonth() + 1)}-${two(date.getDate())}`;
}
