import { Injectable } from '@nestjs/common';
import { DataSource } from 'typeorm';
import { AppError } from '../common/app-error';
import { isUniqueViolation } from '../database/database-errors';
import { refreshFiling } from '../captures/refresh-filing';
import type { ConditionDto } from './dto/unit.dto';
import type { CreateConditionDto, UpdateConditionDto } from './dto/write-unit.dto';
import { UnitCondition } from './unit-condition.entity';
import { Unit } from './unit.entity';

/** The states a unit was measured in. */
@Injectable()
export class ConditionsService {
  constructor(private readonly dataSource: DataSource) {}

  async create(
    unitId: string,
    { name, notes = '', startedOn = null }: CreateConditionDto,
  ): Promise<ConditionDto> {
    if (!(await this.dataSource.getRepository(Unit).existsBy({ id: unitId })))
      throw new AppError('NOT_FOUND');
    const conditions = this.dataSource.getRepository(UnitCondition);
    const { identifiers } = await refusingEqualNames(() =>
      conditions.insert({ unitId, name, notes, startedOn }),
    );
    return { id: (identifiers[0] as { id: string }).id, name, notes, startedOn, captureCount: 0 };
  }

  async update(id: string, changes: UpdateConditionDto): Promise<ConditionDto> {
    const given = Object.fromEntries(Object.entries(changes).filter(([, value]) => value !== undefined));
    await this.dataSource.transaction(async (tx) => {
      const found = await tx.findOne(UnitCondition, { where: { id }, lock: { mode: 'pessimistic_write' } });
      if (!found) throw new AppError('NOT_FOUND');
      if (Object.keys(given).length === 0) return;
      await refusingEqualNames(() => tx.update(UnitCondition, { id }, given));
      await refreshFiling(tx, 'condition_id', id);
    });
    const rows = await this.dataSource.query<ConditionDto[]>(
      `SELECT k.id, k.name, k.notes, k.started_on::text AS "startedOn",
        (SELECT count(*)::integer FROM capture WHERE condition_id = k.id) AS "captureCount"
       FROM unit_condition AS k WHERE k.id = $1`,
      [id],
    );
    const [row] = rows;
    if (!row) throw new AppError('NOT_FOUND');
    return row;
  }
}

async function refusingEqualNames<T>(write: () => Promise<T>): Promise<T> {
  try {
    return await write();
  } catch (error) {
    if (!isUniqueViolation(error, 'uq_unit_condition_name')) throw error;
    throw new AppError('CONFLICT', {
      detail: 'The unit has a condition of this name already.',
      fields: { name: ['is taken by another condition of this unit'] },
    });
  }
}
