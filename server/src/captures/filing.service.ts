import { Injectable } from '@nestjs/common';
import { DataSource, type EntityManager } from 'typeorm';
import { AuditService } from '../audit/audit.service';
import type { Actor } from '../common/actor';
import { AppError } from '../common/app-error';
import { Rig } from '../rigs/rig.entity';
import { UnitCondition } from '../units/unit-condition.entity';
import { Unit } from '../units/unit.entity';
import { Capture } from './capture.entity';
import type { FileCaptureDto } from './dto/file-capture.dto';
import { refreshFiling } from './refresh-filing';

export interface Filing {
  readonly unitId: string | null;
  readonly conditionId: string | null;
  readonly rigId: string | null;
}

/** Under which unit, condition and rig a capture stands. */
@Injectable()
export class FilingService {
  constructor(
    private readonly dataSource: DataSource,
    private readonly audit: AuditService,
  ) {}

  async file(captureId: string, changes: FileCaptureDto, actor: Actor): Promise<void> {
    await this.dataSource.transaction(async (tx) => {
      const capture = await tx.findOne(Capture, {
        where: { id: captureId },
        lock: { mode: 'pessimistic_write' },
      });
      if (!capture) throw new AppError('NOT_FOUND');
      const isOtherUnit = changes.unitId !== undefined && changes.unitId !== capture.unitId;
      const filing = await resolveFiling(tx, {
        unitId:
          changes.unitId === undefined && !changes.conditionId ? capture.unitId : (changes.unitId ?? null),
        // A condition belongs to its unit: it doesn't outlast a change of the unit.
        conditionId:
          changes.conditionId === undefined
            ? isOtherUnit
              ? null
              : capture.conditionId
            : changes.conditionId,
        rigId: changes.rigId === undefined ? capture.rigId : changes.rigId,
      });
      await tx.update(Capture, { id: captureId }, { ...filing, note: changes.note ?? capture.note });
      await refreshFiling(tx, 'id', captureId);
      const detail = Object.keys(changes)
        .filter((key) => changes[key as keyof FileCaptureDto] !== undefined)
        .join(', ');
      await this.audit.record(
        actor,
        { action: 'capture.filed', subject: `capture:${captureId}`, detail },
        tx,
      );
    });
  }
}

/**
 * Checks that unit, condition and rig are there and belong together; a condition alone brings its unit.
 *
 * @throws AppError VALIDATION_FAILED naming the field
 */
export async function resolveFiling(tx: EntityManager, filing: Filing): Promise<Filing> {
  const { conditionId, rigId } = filing;
  let { unitId } = filing;
  if (conditionId !== null) {
    const condition = await tx.findOneBy(UnitCondition, { id: conditionId });
    if (!condition) throw unknown('conditionId', 'is not a known condition');
    if (unitId !== null && condition.unitId !== unitId) {
      throw unknown('conditionId', 'is a condition of another unit');
    }
    unitId = condition.unitId;
  }
  if (unitId !== null && !(await tx.existsBy(Unit, { id: unitId })))
    throw unknown('unitId', 'is not a known unit');
  if (rigId !== null && !(await tx.existsBy(Rig, { id: rigId })))
    throw unknown('rigId', 'is not a known rig');
  return { unitId, conditionId, rigId };
}

function unknown(field: string, message: string): AppError {
  return new AppError('VALIDATION_FAILED', { fields: { [field]: [message] } });
}
