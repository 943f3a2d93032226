import { Injectable } from '@nestjs/common';
import { DataSource } from 'typeorm';
import { AuditService } from '../audit/audit.service';
import { refreshFiling } from '../captures/refresh-filing';
import type { Actor } from '../common/actor';
import { AppError } from '../common/app-error';
import { isUniqueViolation } from '../database/database-errors';
import { dayOf } from './calibration-state';
import type { CreateRigDto, RigDto, UpdateRigDto } from './dto/rig.dto';
import { Rig } from './rig.entity';

type RigRow = Omit<RigDto, 'createdAt' | 'calibrationState'> & { createdAt: Date };

const RIG_SELECT = `SELECT g.id, g.name, g.interface, g.source, g.cables, g.supply, g.load,
    g.limit_dbfs AS "limitDbfs", g.notes, g.created_at AS "createdAt",
    (SELECT count(*)::integer FROM capture WHERE rig_id = g.id) AS "captureCount",
    (SELECT max(valid_until)::text FROM rig_calibration
      WHERE rig_id = g.id AND direction = 'input' AND retired_at IS NULL) AS "calibratedUntil"
  FROM rig AS g`;

/** The chains that units are measured with. */
@Injectable()
export class RigsService {
  constructor(
    private readonly dataSource: DataSource,
    private readonly audit: AuditService,
  ) {}

  async list(): Promise<RigDto[]> {
    const rows = await this.dataSource.query<RigRow[]>(`${RIG_SELECT} ORDER BY g.name, g.id`);
    return rows.map(toRigDto);
  }

  /** @throws AppError NOT_FOUND */
  async get(id: string): Promise<RigDto> {
    const [row] = await this.dataSource.query<RigRow[]>(`${RIG_SELECT} WHERE g.id = $1`, [id]);
    if (!row) throw new AppError('NOT_FOUND');
    return toRigDto(row);
  }

  /** @param actor - null: the program itself, at seed time */
  async create(facts: CreateRigDto, actor: Actor | null): Promise<RigDto> {
    const id = await this.dataSource.transaction(async (tx) => {
      const { identifiers } = await refusingEqualNames(() => tx.insert(Rig, { ...facts }));
      const { id } = identifiers[0] as { id: string };
      await this.audit.record(actor, { action: 'rig.added', subject: `rig:${id}`, detail: facts.name }, tx);
      return id;
    });
    return this.get(id);
  }

  async update(id: string, changes: UpdateRigDto, actor: Actor): Promise<RigDto> {
    const given = Object.fromEntries(Object.entries(changes).filter(([, value]) => value !== undefined));
    await this.dataSource.transaction(async (tx) => {
      const rig = await tx.findOne(Rig, { where: { id }, lock: { mode: 'pessimistic_write' } });
      if (!rig) throw new AppError('NOT_FOUND');
      if (Object.keys(given).length === 0) return;
      await refusingEqualNames(() => tx.update(Rig, { id }, given));
      if (changes.name !== undefined && changes.name !== rig.name) await refreshFiling(tx, 'rig_id', id);
      const detail = JSON.stringify(given);
      await this.audit.record(actor, { action: 'rig.changed', subject: `rig:${id}`, detail }, tx);
    });
    return this.get(id);
  }
}

function toRigDto({ createdAt, ...row }: RigRow): RigDto {
  const { calibratedUntil } = row;
  const state =
    calibratedUntil === null ? 'none' : dayOf(new Date()) <= calibratedUntil ? 'valid' : 'expired';
  return { ...row, createdAt: createdAt.toISOString(), calibrationState: state };
}

async function refusingEqualNames<T>(write: () => Promise<T>): Promise<T> {
  try {
    return await write();
  } catch (error) {
    if (!isUniqueViolation(error, 'uq_rig_name')) throw error;
    throw new AppError('CONFLICT', {
      detail: 'There is a rig of this name already.',
      fields: { name: ['is taken by another rig'] },
    });
  }
}
