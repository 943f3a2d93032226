import {
  DspInputError,
  MEASURE_IDS,
  parseDescriptor,
  type AnalysisSettings,
  type MeasureId,
} from '@benchlark/dsp';
import { z } from 'zod';
import { AppError } from '../common/app-error';
import type { RigChoice } from '../rigs/rig-settings.service';

/** How a capture was taken on the Live page: kept as it was said, beside the samples. */
export interface Take {
  readonly schema: 'benchlark-take/1';
  readonly kind: string;
  /** What the first analysis measures, with which settings; the descriptor of what was played among them. */
  readonly measure: MeasureId;
  readonly settings: TakeSettings;
  readonly startedAt: string;
  /** True: the unit was a practice device in the page. */
  readonly isPractice: boolean;
  readonly input: TakeEnd;
  readonly output: TakeEnd;
  /** Stretches of the recording that its own content shows to be damaged, seconds. */
  readonly breaks: { readonly kind: string; readonly fromS: number; readonly toS: number }[];
  readonly notes: { readonly atS: number; readonly text: string }[];
  /** Takes of one series share its name. */
  readonly series: { readonly id: string; readonly index: number; readonly count: number } | null;
}

/** Calibration and baseline are named by their ids; the analysis is given them in full. */
export type TakeSettings = Omit<AnalysisSettings, 'calibration' | 'baseline'> & RigChoice;

export interface TakeEnd {
  readonly label: string;
  readonly sampleRateHz: number;
  readonly channelCount: number;
  /** Of an input: the grid that its samples sit on, in words. */
  readonly resolution?: string;
}

const seconds = z.number().min(0).max(86_400);
const hertz = z.number().min(0).max(10_000_000);
const words = (most: number) => z.string().max(most);
const end = z.strictObject({
  label: words(200),
  sampleRateHz: hertz,
  channelCount: z.int().min(1).max(64),
  resolution: words(200).optional(),
});

const takeShape = z.strictObject({
  schema: z.literal('benchlark-take/1'),
  kind: words(40).min(1),
  measure: z.enum(MEASURE_IDS),
  settings: z.strictObject({
    fromS: seconds.optional(),
    toS: seconds.optional(),
    bandLowHz: hertz.optional(),
    bandHighHz: hertz.optional(),
    highestHarmonic: z.int().min(2).max(100).optional(),
    descriptor: z.record(z.string(), z.unknown()).nullable().optional(),
    calibrationId: z.uuid().nullable().optional(),
    baselineId: z.uuid().nullable().optional(),
  }),
  startedAt: z.iso.datetime(),
  isPractice: z.boolean(),
  input: end,
  output: end,
  breaks: z.array(z.strictObject({ kind: words(40), fromS: seconds, toS: seconds })).max(200),
  notes: z.array(z.strictObject({ atS: seconds, text: words(1000) })).max(100),
  series: z
    .strictObject({ id: words(60), index: z.int().min(1).max(100), count: z.int().min(1).max(100) })
    .nullable(),
});

/**
 * Reads the form field that a take comes with.
 *
 * @throws AppError VALIDATION_FAILED naming the first place that doesn't fit
 */
export function parseTake(text: string): Take {
  const read = takeShape.safeParse(jsonOf(text));
  if (!read.success) {
    const [issue] = read.error.issues;
    refuse(`${issue?.path.join('.') || 'it'}: ${issue?.message ?? 'is not a take'}`);
  }
  const { descriptor, ...settings } = read.data.settings;
  if (settings.fromS !== undefined && settings.toS !== undefined && settings.fromS >= settings.toS) {
    refuse('settings.toS must come after fromS');
  }
  try {
    const played =
      descriptor === undefined || descriptor === null ? {} : { descriptor: parseDescriptor(descriptor) };
    return { ...read.data, settings: { ...settings, ...played } };
  } catch (error) {
    if (!(error instanceof DspInputError)) throw error;
    return refuse(`settings.descriptor: ${error.message}`);
  }
}

function jsonOf(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return refuse('is not JSON');
  }
}

function refuse(message: string): never {
  throw new AppError('VALIDATION_FAILED', { fields: { take: [message] } });
}
