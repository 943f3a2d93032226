import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { Worker } from 'node:worker_threads';
import { DspInputError, type AnalysisSettings, type MeasureId } from '@benchlark/dsp';
import type { AnalysisOutcome, ThreadMessage } from './analysis-thread-messages';

export interface AnalysisInput {
  /** A file on this machine whose bytes have the hash. */
  readonly path: string;
  readonly sha256: string;
  readonly measure: MeasureId | null;
  readonly settings: AnalysisSettings;
}

export interface AnalysisLimits {
  /** Heap of the thread; beyond it the thread ends, and this process goes on. */
  readonly memoryMb: number;
  /** A thread that reports nothing for so long is ended. */
  readonly stallMs: number;
  readonly signal: AbortSignal;
  readonly onProgress?: (share: number) => void;
}

/** The thread ended without a result, or threw what dsp never throws on purpose. */
export class AnalysisCrash extends Error {
  override readonly name = 'AnalysisCrash';
}

export class AnalysisEnded extends Error {
  override readonly name = 'AnalysisEnded';
}

/** Compiled beside this file; when this file runs from its source (under a test), the built one is taken. */
function threadFile(): string {
  const beside = join(__dirname, 'analysis.thread.js');
  return existsSync(beside) ? beside : join(__dirname, '../../dist/jobs/analysis.thread.js');
}

/**
 * Analyses a capture in a thread of its own, so that this process goes on answering and beating meanwhile.
 *
 * @throws DspInputError when the capture can't be measured as asked; AnalysisCrash when the thread broke down;
 *   AnalysisEnded when the signal ended it
 */
export async function runAnalysis(input: AnalysisInput, limits: AnalysisLimits): Promise<AnalysisOutcome> {
  if (limits.signal.aborted) throw new AnalysisEnded('the analysis was ended');
  const thread = new Worker(threadFile(), {
    workerData: input,
    resourceLimits: { maxOldGenerationSizeMb: limits.memoryMb },
    stdout: false,
    stderr: false,
  });
  let stall: NodeJS.Timeout | undefined;
  let endEarly: (error: Error) => void = () => undefined;
  const onAbort = () => endEarly(new AnalysisEnded('the analysis was ended'));
  limits.signal.addEventListener('abort', onAbort, { once: true });
  try {
    return await new Promise<AnalysisOutcome>((resolve, reject) => {
      endEarly = reject;
      const restartStall = () => {
        clearTimeout(stall);
        const message = `no progress for ${Math.round(limits.stallMs / 1000)} s`;
        stall = setTimeout(() => reject(new AnalysisCrash(message)), limits.stallMs);
      };
      restartStall();
      thread.on('message', (message: ThreadMessage) => {
        restartStall();
        if (message.kind === 'progress') limits.onProgress?.(message.share);
        else if (message.kind === 'outcome') resolve(message.outcome);
        else if (message.kind === 'refused')
          reject(new DspInputError(message.code, message.message, message.details));
        else reject(new AnalysisCrash(message.message));
      });
      thread.once('error', (error: Error & { code?: string }) => {
        const isOutOfMemory = error.code === 'ERR_WORKER_OUT_OF_MEMORY';
        reject(
          new AnalysisCrash(isOutOfMemory ? `it needed more than ${limits.memoryMb} MB` : error.message),
        );
      });
      thread.once('exit', (code) =>
        reject(new AnalysisCrash(`the analysing thread ended with code ${code}`)),
      );
    });
  } finally {
    clearTimeout(stall);
    limits.signal.removeEventListener('abort', onAbort);
    await thread.terminate();
  }
}
