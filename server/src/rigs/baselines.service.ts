import { Injectable } from '@nestjs/common';
import type { MeasureId } from '@benchlark/dsp';
import { DataSource, type EntityManager } from 'typeorm';
import { AuditService } from '../audit/audit.service';
import { Capture } from '../captures/capture.entity';
import type { Actor, SignedInPerson } from '../common/actor';
import { AppError } from '../common/app-error';
import { isUniqueViolation } from '../database/database-errors';
import type { BaselineDto, CreateBaselineDto } from './dto/baseline.dto';
import { RigBaseline } from './rig-baseline.entity';
import { Rig } from './rig.entity';

/** The measures that look their floors up in a baseline; a programme is one of all its parts. */
const BASELINE_MEASURES: readonly MeasureId[] = ['tone', 'idle', 'dynamic-range', 'two-tone', 'programme'];

type BaselineRow = Omit<BaselineDto, 'createdAt' | 'retiredAt'> & { createdAt: Date; retiredAt: Date | null };

/** What a rig measures of itself, with a cable in the unit's place. */
@Injectable()
export class BaselinesService {
  constructor(
    private readonly dataSource: DataSource,
    private readonly audit: AuditService,
  ) {}

  /** Of a rig, newest first. @throws AppError NOT_FOUND */
  async list(rigId: string): Promise<BaselineDto[]> {
    if (!(await this.dataSource.getRepository(Rig).existsBy({ id: rigId }))) throw new AppError('NOT_FOUND');
    const rows = await this.dataSource.query<BaselineRow[]>(
      `SELECT b.id, b.capture_id AS "captureId", c.number AS "captureNumber", b.record_id AS "recordId", r.measure,
         c.record_id <> b.record_id AS "hasNewerRecord", b.input_range AS "inputRange",
         b.sample_rate_hz AS "sampleRateHz", b.created_at AS "createdAt", b.retired_at AS "retiredAt",
         json_build_object('id', p.id, 'displayName', p.display_name) AS "createdBy"
       FROM rig_baseline AS b JOIN capture AS c ON c.id = b.capture_id JOIN record AS r ON r.id = b.record_id
         JOIN person AS p ON p.id = b.created_by
       WHERE b.rig_id = $1 ORDER BY b.created_at DESC, b.id`,
      [rigId],
    );
    return rows.map((row) => ({
      ...row,
      createdAt: row.createdAt.toISOString(),
      retiredAt: row.retiredAt?.toISOString() ?? null,
    }));
  }

  /** Names a capture's newest record as a baseline of the rig. @throws AppError NOT_FOUND, VALIDATION_FAILED, CONFLICT */
  async create(
    rigId: string,
    { captureId, inputRange }: CreateBaselineDto,
    { person, actor }: { person: SignedInPerson; actor: Actor },
  ): Promise<BaselineDto> {
    const id = await this.dataSource.transaction(async (tx) => {
      if (!(await tx.existsBy(Rig, { id: rigId }))) throw new AppError('NOT_FOUND');
      const { recordId, sampleRateHz } = await loopbackOf(tx, rigId, captureId);
      const row = { rigId, captureId, recordId, inputRange, sampleRateHz, createdById: person.id };
      const { identifiers } = await refusingSecond(() => tx.insert(RigBaseline, row));
      const { id } = identifiers[0] as { id: string };
      const detail = `rig ${rigId}: capture ${captureId}, record ${recordId}, ${inputRange}`;
      await this.audit.record(actor, { action: 'baseline.named', subject: `baseline:${id}`, detail }, tx);
      return id;
    });
    return this.get(rigId, id);
  }

  /** Takes it out of use, once; records that embed it keep it. @throws AppError NOT_FOUND, CONFLICT */
  async retire(
    rigId: string,
    id: string,
    { person, actor }: { person: SignedInPerson; actor: Actor },
  ): Promise<BaselineDto> {
    await this.dataSource.transaction(async (tx) => {
      const found = await tx.findOne(RigBaseline, {
        where: { id, rigId },
        lock: { mode: 'pessimistic_write' },
      });
      if (!found) throw new AppError('NOT_FOUND');
      if (found.retiredAt) throw new AppError('CONFLICT', { detail: 'The baseline is retired already.' });
      await tx.update(RigBaseline, { id }, { retiredAt: () => 'now()', retiredById: person.id });
      const fact = { action: 'baseline.retired', subject: `baseline:${id}`, detail: `rig ${rigId}` };
      await this.audit.record(actor, fact, tx);
    });
    return this.get(rigId, id);
  }

  private async get(rigId: string, id: string): Promise<BaselineDto> {
    const found = (await this.list(rigId)).find((baseline) => baseline.id === id);
    if (!found) throw new AppError('NOT_FOUND');
    return found;
  }
}

/** The newest record of a capture that shows the rig alone. @throws AppError VALIDATION_FAILED saying why it doesn't */
async function loopbackOf(
  tx: EntityManager,
  rigId: string,
  captureId: string,
): Promise<{ recordId: string; sampleRateHz: number }> {
  const capture = await tx.findOneBy(Capture, { id: captureId });
  if (!capture) return refuse('is not a known recording');
  if (capture.rigId === null) refuse('is filed under no rig: file it under this one first');
  if (capture.rigId !== rigId) refuse('is a recording of another rig');
  if (capture.unitId !== null)
    refuse('is a recording of a unit: a baseline is the rig alone, through a cable');
  if (capture.isPractice) refuse('is a practice recording: a baseline is of a real rig');
  const { recordId } = capture;
  if (recordId === null) return refuse('has no record yet: wait for its analysis');
  if (!(BASELINE_MEASURES as readonly string[]).includes(capture.measure)) {
    refuse(`holds the measure “${capture.measure}”; a baseline is one of ${BASELINE_MEASURES.join(', ')}`);
  }
  return { recordId, sampleRateHz: capture.sampleRateHz };
}

async function refusingSecond<T>(write: () => Promise<T>): Promise<T> {
  try {
    return await write();
  } catch (error) {
    if (!isUniqueViolation(error, 'uq_rig_baseline_record')) throw error;
    throw new AppError('CONFLICT', { detail: 'This record is a baseline of the rig in this range already.' });
  }
}

function refuse(message: string): never {
  throw new AppError('VALIDATION_FAILED', { fields: { captureId: [message] } });
}
