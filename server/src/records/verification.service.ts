import { Inject, Injectable, type OnApplicationShutdown } from '@nestjs/common';
import { compareRecords, DSP_VERSION, DspInputError } from '@benchlark/dsp';
import { DataSource } from 'typeorm';
import { AppError } from '../common/app-error';
import { ENV } from '../config/env.module';
import type { Env } from '../config/env.schema';
import { Capture } from '../captures/capture.entity';
import { runAnalysis } from '../jobs/run-analysis';
import { EvidenceService } from '../storage/evidence.service';
import { ObjectStore } from '../storage/object-store';
import type { VerificationDto } from './dto/record.dto';
import { RecordsService } from './records.service';

/** Verifying computes in this process, in a thread; more people than this are asked to come back. */
const WAITING_MAX = 4;

/** Computes records again and says whether they still hold. */
@Injectable()
export class VerificationService implements OnApplicationShutdown {
  readonly #ending = new AbortController();
  #last: Promise<unknown> = Promise.resolve();
  #waiting = 0;

  constructor(
    private readonly records: RecordsService,
    private readonly evidence: EvidenceService,
    private readonly store: ObjectStore,
    private readonly dataSource: DataSource,
    @Inject(ENV) private readonly env: Env,
  ) {}

  onApplicationShutdown(): void {
    this.#ending.abort();
  }

  /** One at a time. @throws AppError NOT_FOUND, TOO_MANY_REQUESTS */
  async verify(id: string): Promise<VerificationDto> {
    if (this.#waiting >= WAITING_MAX) throw new AppError('TOO_MANY_REQUESTS', { retryAfterS: 10 });
    this.#waiting += 1;
    const turn = this.#last.then(() => this.compute(id));
    this.#last = turn.catch(() => undefined);
    try {
      return await turn;
    } finally {
      this.#waiting -= 1;
    }
  }

  private async compute(id: string): Promise<VerificationDto> {
    const row = await this.records.row(id);
    const { sha256 } = await this.dataSource.getRepository(Capture).findOneByOrFail({ id: row.captureId });
    const evidence = await this.evidence.check(sha256);
    const difference = (path: string, stored: unknown, computed: unknown) => ({
      path,
      stored: plain(stored),
      computed: plain(computed),
    });
    if (evidence !== 'sound') {
      const differing = [difference('capture.sha256', sha256, evidence)];
      return { isEqual: false, differing, evidence, dspVersion: DSP_VERSION };
    }
    const stored = await this.records.withTraces(row);
    const copy = await this.store.localCopy(sha256);
    try {
      const outcome = await runAnalysis(
        { path: copy.path, sha256, measure: row.measure, settings: row.settings },
        {
          memoryMb: this.env.ANALYSIS_MEMORY_MB,
          stallMs: this.env.ANALYSIS_STALL_MS,
          signal: this.#ending.signal,
        },
      );
      const differing = compareRecords(stored, outcome.record).map((found) =>
        difference(found.path, found.stored, found.computed),
      );
      return { isEqual: differing.length === 0, differing, evidence, dspVersion: DSP_VERSION };
    } catch (error) {
      if (!(error instanceof DspInputError)) throw error;
      const differing = [difference('measure', row.measure, error.message)];
      return { isEqual: false, differing, evidence, dspVersion: DSP_VERSION };
    } finally {
      await copy.release();
    }
  }
}

function plain(value: unknown): string | number | null {
  if (value === undefined || value === null) return null;
  return typeof value === 'number' || typeof value === 'string' ? value : JSON.stringify(value);
}
