import type { BenchRecord, Break, StimulusDescriptor } from '@benchlark/dsp';
import type { Delivered } from '../audio/audio-rig';
import type { TakeResult } from '../worker/live-types';
import { gridWords } from './grid-words';

export interface TakeNote {
  readonly atS: number;
  readonly text: string;
}

/** Where a take belongs. */
export interface Filing {
  readonly unitId: string | null;
  readonly conditionId: string | null;
  readonly rigId: string | null;
}

/** How it was made: goes to the server beside the samples. */
export interface TakeStatement {
  readonly schema: 'benchlark-take/1';
  readonly kind: string;
  readonly measure: string;
  readonly settings: Readonly<Record<string, unknown>>;
  readonly startedAt: string;
  readonly isPractice: boolean;
  readonly input: EndStatement;
  readonly output: EndStatement;
  readonly breaks: readonly { kind: string; fromS: number; toS: number }[];
  readonly notes: readonly TakeNote[];
  readonly series: { readonly id: string; readonly index: number; readonly count: number } | null;
}

interface EndStatement {
  readonly label: string;
  readonly sampleRateHz: number;
  readonly channelCount: number;
  readonly resolution?: string;
}

/** A take as this browser keeps it until the archive has it. */
export interface LocalTake {
  readonly id: string;
  readonly fileName: string;
  readonly title: string;
  readonly wav: Blob;
  readonly sha256: string;
  /** Null where it could not be measured, with why. */
  readonly record: BenchRecord | null;
  readonly failure: string | null;
  readonly statement: TakeStatement;
  readonly filing: Filing;
  readonly madeAt: string;
  /** Asked to be archived; sent as soon as there is a way. */
  readonly isKept: boolean;
  readonly isOverloaded: boolean;
}

export interface StatementParts {
  readonly kind: string;
  readonly measure: string;
  readonly descriptor: StimulusDescriptor | null;
  readonly startedAt: string;
  readonly isPractice: boolean;
  readonly delivered: Delivered;
  readonly result: TakeResult;
  readonly notes: readonly TakeNote[];
  readonly series: TakeStatement['series'];
  /** Of the rig's books; the server embeds what they name. */
  readonly calibrationId: string | null;
  readonly baselineId: string | null;
}

export function statementOf(parts: StatementParts): TakeStatement {
  const { kind, measure, descriptor, startedAt, isPractice, delivered, result, notes, series } = parts;
  const { calibrationId, baselineId } = parts;
  return {
    schema: 'benchlark-take/1',
    kind,
    measure,
    settings: {
      ...result.settings,
      ...(descriptor ? { descriptor } : {}),
      ...(calibrationId ? { calibrationId } : {}),
      ...(baselineId ? { baselineId } : {}),
    },
    startedAt,
    isPractice,
    input: {
      label: delivered.inputLabel,
      sampleRateHz: result.sampleRateHz,
      channelCount: result.channelCount,
      resolution: gridWords(result.grid).short,
    },
    output: { label: delivered.outputLabel, sampleRateHz: delivered.outputRateHz, channelCount: 2 },
    breaks: result.breaks.map((one) => breakInSeconds(one, result.sampleRateHz)),
    notes,
    series,
  };
}

function breakInSeconds({ kind, fromFrame, toFrame }: Break, sampleRateHz: number) {
  return {
    kind,
    fromS: Math.max(0, fromFrame) / sampleRateHz,
    toS: Math.max(0, toFrame) / sampleRateHz,
  };
}

/** "level-steps-2026-12-01-140211.wav": kinds and times tell takes apart on a disk. */
export function takeFileName(kind: string, startedAt: string, isPractice: boolean): string {
  const stamp = startedAt.slice(0, 19).replace('T', '-').replaceAll(':', '');
  return `${isPractice ? 'practice-' : ''}${kind}-${stamp}.wav`;
}
