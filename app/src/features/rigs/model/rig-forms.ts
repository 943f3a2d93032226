import { z } from 'zod';
import type { Rig } from '@/lib/api-schema';
import type { components } from '@/lib/api-types';
import { decimal, optionalDecimal } from './decimal-field';

type Schemas = components['schemas'];

const fact = z.string().trim().max(200, 'At most 200 characters');

export const rigSchema = z.object({
  name: z.string().trim().min(1, 'Give the rig a name').max(120, 'At most 120 characters'),
  interface: fact,
  source: fact,
  cables: fact,
  supply: fact,
  load: fact,
  limitDbfs: optionalDecimal({ least: -120, most: 0 }, 'A level from −120 to 0 dBFS, or nothing'),
  notes: z.string().trim().max(4000, 'At most 4000 characters'),
});

export type RigFields = z.input<typeof rigSchema>;
export type RigValues = z.output<typeof rigSchema> & Schemas['CreateRigDto'];

export function rigFieldsOf(rig: Rig | undefined): RigFields {
  return {
    name: rig?.name ?? '',
    interface: rig?.interface ?? '',
    source: rig?.source ?? '',
    cables: rig?.cables ?? '',
    supply: rig?.supply ?? '',
    load: rig?.load ?? '',
    limitDbfs: rig?.limitDbfs == null ? '' : String(rig.limitDbfs),
    notes: rig?.notes ?? '',
  };
}

export const baselineSchema = z.object({
  captureId: z.uuid('Choose a recording'),
  inputRange: z.string().trim().min(1, 'In which range was it taken?').max(120, 'At most 120 characters'),
}) satisfies z.ZodType<Schemas['CreateBaselineDto']>;

export type BaselineValues = z.infer<typeof baselineSchema>;

const RATES = { least: 8_000, most: 768_000 };

export const calibrationSchema = z
  .object({
    direction: z.enum(['input', 'output']),
    channel: z.enum(['all', 'left', 'right']),
    range: z.string().trim().min(1, 'Which range or gain?').max(120, 'At most 120 characters'),
    sampleRateHz: decimal(RATES, 'A rate from 8000 to 768000 Hz').refine(
      Number.isInteger,
      'A whole number of Hz',
    ),
    frequencyHz: decimal({ least: 1, most: 200_000 }, 'A frequency from 1 Hz to 200 kHz'),
    meterVrms: decimal({ least: 1e-6, most: 10_000 }, 'A voltage above 0 and up to 10000 V'),
    levelDbfs: decimal({ least: -120, most: 0 }, 'A level from −120 to 0 dBFS'),
    dividerRatio: decimal({ least: 1, most: 10_000 }, 'A ratio from 1 to 10000; 1 is no divider'),
    loadOhm: optionalDecimal({ least: 0.1, most: 1e9 }, 'A load above 0.1 ohm, or nothing'),
    meter: z.string().trim().min(1, 'Which meter?').max(120, 'At most 120 characters'),
    meterUncertaintyPercent: decimal({ least: 0, most: 50 }, 'A percentage from 0 to 50'),
    takenOn: z.iso.date('This is not a day'),
    validUntil: z.iso.date('This is not a day'),
    notes: z.string().trim().max(4000, 'At most 4000 characters'),
  })
  .refine(({ takenOn, validUntil }) => validUntil >= takenOn, {
    path: ['validUntil'],
    message: 'This lies before the day it was taken',
  });

export type CalibrationFields = z.input<typeof calibrationSchema>;
export type CalibrationValues = z.output<typeof calibrationSchema>;
