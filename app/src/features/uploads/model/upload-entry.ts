import type { ApiError } from '@/lib/api-error';
import type { Capture } from '@/lib/api-schema';

/** Where the files of a batch belong; what is missing stays unsorted. */
export interface BatchFiling {
  readonly unitId?: string;
  readonly conditionId?: string;
  readonly rigId?: string;
}

export type UploadPhase = 'waiting' | 'sending' | 'stored' | 'refused' | 'cancelled';

export interface AnalysisState {
  readonly state: Capture['state'];
  readonly progress: number | null;
}

/** One file on its way into the archive. */
export interface UploadEntry {
  readonly id: string;
  readonly file: File;
  readonly filing: BatchFiling;
  readonly phase: UploadPhase;
  readonly sentBytes: number;
  readonly startedAtMs: number | null;
  readonly capture: Capture | null;
  readonly analysis: AnalysisState | null;
  readonly error: ApiError | null;
}

/** Seconds until all bytes are sent, as far as the rate so far tells; null while it tells nothing. */
export function secondsLeft(entry: UploadEntry, nowMs: number): number | null {
  if (entry.phase !== 'sending' || entry.startedAtMs === null || entry.sentBytes === 0) return null;
  const elapsedS = (nowMs - entry.startedAtMs) / 1000;
  if (elapsedS < 1) return null;
  return ((entry.file.size - entry.sentBytes) * elapsedS) / entry.sentBytes;
}

export function isOnItsWay(entry: UploadEntry): boolean {
  return entry.phase === 'waiting' || entry.phase === 'sending';
}

/** Nothing more will happen to it by itself: it can be put away. */
export function isSettled(entry: UploadEntry): boolean {
  if (isOnItsWay(entry)) return false;
  return entry.analysis === null || !['queued', 'analysing'].includes(entry.analysis.state);
}
