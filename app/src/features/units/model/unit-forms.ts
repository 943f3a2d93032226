import { z } from 'zod';
import type { Unit } from '@/lib/api-schema';
import type { components } from '@/lib/api-types';

type Schemas = components['schemas'];

export const KIND_WORDS: Record<Unit['kind'], string> = {
  converter: 'converter',
  'headphone-amplifier': 'headphone amplifier',
  'power-amplifier': 'power amplifier',
  streamer: 'streamer',
  'phono-stage': 'phono stage',
  other: 'other',
};

const KINDS = Object.keys(KIND_WORDS) as [Unit['kind'], ...Unit['kind'][]];

export const KIND_OPTIONS = KINDS.map((value) => ({ value, label: KIND_WORDS[value] }));

const notes = z.string().trim().max(4000, 'At most 4000 characters');

export const unitSchema = z.object({
  maker: z.string().trim().min(1, 'Who made it?').max(120, 'At most 120 characters'),
  model: z.string().trim().min(1, 'What is it called?').max(120, 'At most 120 characters'),
  serialNumber: z.string().trim().max(120, 'At most 120 characters'),
  kind: z.enum(KINDS),
  notes,
}) satisfies z.ZodType<Schemas['CreateUnitDto']>;

export type UnitValues = z.infer<typeof unitSchema>;

export const conditionSchema = z.object({
  name: z.string().trim().min(1, 'Name the state it was measured in').max(120, 'At most 120 characters'),
  startedOn: z.union([z.literal(''), z.iso.date('This is not a day')]),
  notes,
}) satisfies z.ZodType<Schemas['CreateConditionDto']>;

export type ConditionValues = z.infer<typeof conditionSchema>;

/** What the server takes: an empty field of a new unit is left out. */
export function toNewUnit({ serialNumber, ...unit }: UnitValues): Schemas['CreateUnitDto'] {
  return serialNumber === '' ? unit : { ...unit, serialNumber };
}

/** For a unit that is on the books already, an emptied field is cleared. */
export function toUnitChange({ serialNumber, ...unit }: UnitValues): Schemas['UpdateUnitDto'] {
  return { ...unit, serialNumber: serialNumber === '' ? null : serialNumber };
}

export function toNewCondition({ startedOn, ...condition }: ConditionValues): Schemas['CreateConditionDto'] {
  return startedOn === '' ? condition : { ...condition, startedOn };
}

export function toConditionChange({
  startedOn,
  ...condition
}: ConditionValues): Schemas['UpdateConditionDto'] {
  return { ...condition, startedOn: startedOn === '' ? null : startedOn };
}
