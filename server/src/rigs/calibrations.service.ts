import { Injectable } from '@nestjs/common';
import { DataSource } from 'typeorm';
import { AuditService } from '../audit/audit.service';
import type { Actor, SignedInPerson } from '../common/actor';
import { AppError } from '../common/app-error';
import { calibrationState, dayOf } from './calibration-state';
import type { CalibrationDto, CreateCalibrationDto } from './dto/calibration.dto';
import { fullScaleVrms, isFollowedBy } from './embed-calibration';
import { RigCalibration } from './rig-calibration.entity';
import { Rig } from './rig.entity';

const DAY_MS = 86_400_000;

/** Volts at digital full scale: each as it was once measured, never changed. */
@Injectable()
export class CalibrationsService {
  constructor(
    private readonly dataSource: DataSource,
    private readonly audit: AuditService,
  ) {}

  /** Of a rig, newest first. @throws AppError NOT_FOUND */
  async list(rigId: string): Promise<CalibrationDto[]> {
    if (!(await this.dataSource.getRepository(Rig).existsBy({ id: rigId }))) throw new AppError('NOT_FOUND');
    const rows = await this.dataSource.getRepository(RigCalibration).find({
      where: { rigId },
      relations: { createdBy: true },
      order: { takenOn: 'DESC', createdAt: 'DESC', id: 'ASC' },
    });
    return rows.map((row) => toCalibrationDto(row, rows));
  }

  /**
   * Enters a calibration; an older one of the same channel and setting stays and is followed by it.
   *
   * @param actor - null: the program itself, at seed time
   */
  async create(
    rigId: string,
    facts: CreateCalibrationDto,
    { person, actor }: { person: SignedInPerson; actor: Actor | null },
  ): Promise<CalibrationDto> {
    // The day after tomorrow is nowhere today yet.
    if (facts.takenOn > dayOf(new Date(Date.now() + DAY_MS))) refuse('takenOn', 'lies in the future');
    if (facts.validUntil < facts.takenOn) refuse('validUntil', 'lies before the day it was taken');
    const id = await this.dataSource.transaction(async (tx) => {
      if (!(await tx.existsBy(Rig, { id: rigId }))) throw new AppError('NOT_FOUND');
      const { identifiers } = await tx.insert(RigCalibration, { ...facts, rigId, createdById: person.id });
      const { id } = identifiers[0] as { id: string };
      const fact = {
        action: 'calibration.made',
        subject: `calibration:${id}`,
        detail: `rig ${rigId}: ${JSON.stringify(facts)}`,
      };
      await this.audit.record(actor, fact, tx);
      return id;
    });
    return this.get(rigId, id);
  }

  /** Takes it out of use, once; records that embed it keep it. @throws AppError NOT_FOUND, CONFLICT */
  async retire(
    rigId: string,
    id: string,
    { person, actor }: { person: SignedInPerson; actor: Actor },
  ): Promise<CalibrationDto> {
    await this.dataSource.transaction(async (tx) => {
      const found = await tx.findOne(RigCalibration, {
        where: { id, rigId },
        lock: { mode: 'pessimistic_write' },
      });
      if (!found) throw new AppError('NOT_FOUND');
      if (found.retiredAt) throw new AppError('CONFLICT', { detail: 'The calibration is retired already.' });
      await tx.update(RigCalibration, { id }, { retiredAt: () => 'now()', retiredById: person.id });
      await this.audit.record(
        actor,
        { action: 'calibration.retired', subject: `calibration:${id}`, detail: `rig ${rigId}` },
        tx,
      );
    });
    return this.get(rigId, id);
  }

  private async get(rigId: string, id: string): Promise<CalibrationDto> {
    const found = (await this.list(rigId)).find((calibration) => calibration.id === id);
    if (!found) throw new AppError('NOT_FOUND');
    return found;
  }
}

function toCalibrationDto(row: RigCalibration, all: readonly RigCalibration[]): CalibrationDto {
  return {
    id: row.id,
    rigId: row.rigId,
    channel: row.channel,
    direction: row.direction,
    range: row.range,
    sampleRateHz: row.sampleRateHz,
    frequencyHz: row.frequencyHz,
    voltsRmsAtFullScale: row.voltsRmsAtFullScale,
    dividerRatio: row.dividerRatio,
    fullScaleVrms: fullScaleVrms(row),
    loadOhm: row.loadOhm,
    meter: row.meter,
    meterUncertaintyPercent: row.meterUncertaintyPercent,
    takenOn: row.takenOn,
    validUntil: row.validUntil,
    notes: row.notes,
    createdAt: row.createdAt.toISOString(),
    createdBy: { id: row.createdById, displayName: row.createdBy?.displayName ?? '' },
    state: calibrationState(row, dayOf(new Date())),
    isFollowed: all.some((other) => other.retiredAt === null && isFollowedBy(row, other)),
    retiredAt: row.retiredAt?.toISOString() ?? null,
  };
}

function refuse(field: string, message: string): never {
  throw new AppError('VALIDATION_FAILED', { fields: { [field]: [message] } });
}
