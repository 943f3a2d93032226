import { Inject, Injectable, Logger } from '@nestjs/common';
import { DspInputError } from '@benchlark/dsp';
import { DataSource } from 'typeorm';
import { Capture } from '../captures/capture.entity';
import { ENV } from '../config/env.module';
import type { Env } from '../config/env.schema';
import { EvidenceService } from '../storage/evidence.service';
import { ObjectStore } from '../storage/object-store';
import type { AnalysisJob } from './analysis-job.entity';
import type { AnalysisOutcome } from './analysis-thread-messages';
import { claimJob, failJob, noteProgress, releaseJob } from './job-progress';
import { AnalysisCrash, AnalysisEnded, runAnalysis } from './run-analysis';
import { storeRecord } from './store-record';

/** Also how soon a cancelled or taken-over attempt is ended. */
const PROGRESS_MS = 700;

class EvidenceFault extends Error {
  override readonly name = 'EvidenceFault';

  constructor(readonly evidence: 'damaged' | 'missing') {
    super(
      evidence === 'damaged'
        ? 'The stored bytes no longer have the SHA-256 they were stored under. Upload the original file again.'
        : 'The stored file is gone from the storage. Upload the original file again.',
    );
  }
}

/** One attempt at one analysis: may be run twice, by two workers, and still leaves one record. */
@Injectable()
export class AnalysisTask {
  readonly #logger = new Logger('AnalysisTask');

  constructor(
    private readonly dataSource: DataSource,
    private readonly store: ObjectStore,
    private readonly evidence: EvidenceService,
    @Inject(ENV) private readonly env: Env,
  ) {}

  /**
   * @param ending - aborted when this process is about to end: the job goes back uncounted
   * @throws when the queue shall try again later
   */
  async run(jobId: string, workerId: string, ending: AbortSignal): Promise<void> {
    const job = await claimJob(this.dataSource, jobId, workerId);
    if (!job) return;
    try {
      const outcome = await this.analyse(job, ending);
      if (!outcome) return;
      const recordId = await storeRecord({ dataSource: this.dataSource, store: this.store }, job, outcome);
      if (recordId === null)
        this.#logger.warn(`job ${jobId}: the result of attempt ${job.attempts} came too late`);
    } catch (error) {
      await this.settle(job, error, ending);
    }
  }

  /** @returns null when the attempt was cancelled or taken over meanwhile */
  private async analyse(job: AnalysisJob, ending: AbortSignal): Promise<AnalysisOutcome | null> {
    const { sha256 } = await this.dataSource.getRepository(Capture).findOneByOrFail({ id: job.captureId });
    const evidence = await this.evidence.check(sha256);
    if (evidence !== 'sound') throw new EvidenceFault(evidence);
    const copy = await this.store.localCopy(sha256);
    const overtaken = new AbortController();
    let share = 0;
    let isNoting = false;
    const note = async () => {
      if (isNoting) return;
      isNoting = true;
      try {
        const isValid = await noteProgress(
          this.dataSource,
          job,
          Math.min(0.99, Math.round(share * 100) / 100),
        );
        if (!isValid) overtaken.abort();
      } catch (error) {
        // Progress may be lost while the database is away; the result's own transaction decides.
        this.#logger.warn(`job ${job.id}: progress not noted: ${String(error)}`);
      } finally {
        isNoting = false;
      }
    };
    const timer = setInterval(() => void note(), PROGRESS_MS);
    try {
      return await runAnalysis(
        { path: copy.path, sha256, measure: job.measure, settings: job.settings },
        {
          memoryMb: this.env.ANALYSIS_MEMORY_MB,
          stallMs: this.env.ANALYSIS_STALL_MS,
          signal: AbortSignal.any([ending, overtaken.signal]),
          onProgress: (now) => (share = now),
        },
      );
    } catch (error) {
      if (error instanceof AnalysisEnded && overtaken.signal.aborted) return null;
      throw error;
    } finally {
      clearInterval(timer);
      await copy.release();
    }
  }

  /** What can't become better fails at once; all else is tried again until the tries are used up. */
  private async settle(job: AnalysisJob, error: unknown, ending: AbortSignal): Promise<void> {
    if (error instanceof AnalysisEnded || ending.aborted) {
      await releaseJob(this.dataSource, job, { isCounted: false });
      throw error;
    }
    if (error instanceof DspInputError) {
      const { offset, remedy } = error.details;
      const message = [sentence(error.message), offset === undefined ? '' : `Byte ${offset}.`, remedy ?? ''];
      await failJob(this.dataSource, job, { code: error.code, message: message.filter(Boolean).join(' ') });
      return;
    }
    if (error instanceof EvidenceFault) {
      await failJob(this.dataSource, job, {
        code: `EVIDENCE_${error.evidence.toUpperCase()}`,
        message: error.message,
      });
      return;
    }
    const isCrash = error instanceof AnalysisCrash;
    this.#logger.error({
      err: error,
      msg: `job ${job.id}, attempt ${job.attempts} of ${job.maxAttempts} failed`,
    });
    const failure = {
      code: isCrash ? 'ANALYSIS_CRASHED' : 'ANALYSIS_INTERRUPTED',
      message: isCrash
        ? `The analysis broke down in attempt ${job.attempts} of ${job.maxAttempts}: ${error.message}.`
        : `The analysis could not be ended in attempt ${job.attempts} of ${job.maxAttempts}; the log says why.`,
    };
    if (job.attempts >= job.maxAttempts) {
      await failJob(this.dataSource, job, failure);
      return;
    }
    await releaseJob(this.dataSource, job, { isCounted: true, failure });
    throw error;
  }
}

function sentence(text: string): string {
  const whole = text.charAt(0).toUpperCase() + text.slice(1);
  return /[.!?]$/.test(whole) ? whole : `${whole}.`;
}
