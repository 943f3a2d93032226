import { Injectable } from '@nestjs/common';
import { DataSource } from 'typeorm';
import { AppError } from '../common/app-error';
import { isUuid, readCursor, writeCursor } from '../common/cursor';
import { searchPatterns, searchText } from '../common/search-words';
import { refreshFiling } from '../captures/refresh-filing';
import type { UnitDetailDto, UnitDto, UnitListDto } from './dto/unit.dto';
import type { CreateUnitDto, ListUnitsQuery, UpdateUnitDto } from './dto/write-unit.dto';
import { Unit } from './unit.entity';

const PAGE_LENGTH = 50;
const ORDER = 'name';

interface UnitRow extends Omit<UnitDto, 'createdAt'> {
  createdAt: Date;
  search: string;
}

const UNIT_COLUMNS = `
  u.id, u.maker, u.model, u.serial_number AS "serialNumber", u.kind, u.notes, u.created_at AS "createdAt", u.search,
  (SELECT count(*)::integer FROM capture WHERE unit_id = u.id) AS "captureCount",
  (SELECT coalesce(json_agg(json_build_object(
      'id', k.id, 'name', k.name, 'notes', k.notes, 'startedOn', k.started_on,
      'captureCount', (SELECT count(*) FROM capture WHERE condition_id = k.id)
    ) ORDER BY k.started_on NULLS FIRST, k.created_at, k.id), '[]')
    FROM unit_condition AS k WHERE k.unit_id = u.id) AS conditions`;

/** The devices on the books. */
@Injectable()
export class UnitsService {
  constructor(private readonly dataSource: DataSource) {}

  /** Units by maker, model and serial number. */
  async list({ q, limit = PAGE_LENGTH, cursor }: ListUnitsQuery): Promise<UnitListDto> {
    const patterns = searchPatterns(q);
    const after = cursor === undefined ? null : readCursor(cursor, ORDER, (_, tie) => isUuid(tie));
    const [rows, counted] = await Promise.all([
      this.dataSource.query<UnitRow[]>(
        `SELECT ${UNIT_COLUMNS} FROM unit AS u
         WHERE u.search LIKE ALL ($1) AND ($2::text IS NULL OR (u.search COLLATE "C", u.id) > ($2, $3::uuid))
         ORDER BY u.search COLLATE "C", u.id LIMIT $4`,
        [patterns, after?.value ?? null, after?.tie ?? null, limit + 1],
      ),
      this.dataSource.query<{ total: number }[]>(
        'SELECT count(*)::integer AS total FROM unit WHERE search LIKE ALL ($1)',
        [patterns],
      ),
    ]);
    const page = rows.slice(0, limit);
    const last = rows.length > limit ? page.at(-1) : undefined;
    return {
      items: page.map(toUnitDto),
      nextCursor: last ? writeCursor({ order: ORDER, value: last.search, tie: last.id }) : null,
      total: counted[0]?.total ?? 0,
    };
  }

  async get(id: string): Promise<UnitDetailDto> {
    const rows = await this.dataSource.query<(UnitRow & { lastCaptureAt: Date | null })[]>(
      `SELECT ${UNIT_COLUMNS}, (SELECT max(uploaded_at) FROM capture WHERE unit_id = u.id) AS "lastCaptureAt"
       FROM unit AS u WHERE u.id = $1`,
      [id],
    );
    const [row] = rows;
    if (!row) throw new AppError('NOT_FOUND');
    const filed = row.conditions.reduce((sum, { captureCount }) => sum + captureCount, 0);
    return {
      ...toUnitDto(row),
      captureCountWithoutCondition: row.captureCount - filed,
      lastCaptureAt: row.lastCaptureAt?.toISOString() ?? null,
    };
  }

  async create({
    maker,
    model,
    serialNumber = null,
    kind = 'other',
    notes = '',
  }: CreateUnitDto): Promise<UnitDto> {
    const { identifiers } = await this.dataSource
      .getRepository(Unit)
      .insert({ maker, model, serialNumber, kind, notes, search: searchText([maker, model, serialNumber]) });
    return this.get((identifiers[0] as { id: string }).id);
  }

  async update(id: string, changes: UpdateUnitDto): Promise<UnitDetailDto> {
    await this.dataSource.transaction(async (tx) => {
      const unit = await tx.findOne(Unit, { where: { id }, lock: { mode: 'pessimistic_write' } });
      if (!unit) throw new AppError('NOT_FOUND');
      const given = Object.fromEntries(Object.entries(changes).filter(([, value]) => value !== undefined));
      const { maker, model, serialNumber } = { ...unit, ...given };
      await tx.update(Unit, { id }, { ...given, search: searchText([maker, model, serialNumber]) });
      await refreshFiling(tx, 'unit_id', id);
    });
    return this.get(id);
  }
}

function toUnitDto(row: UnitRow): UnitDto {
  const { id, maker, model, serialNumber, kind, notes, captureCount, conditions } = row;
  return {
    id,
    maker,
    model,
    serialNumber,
    kind,
    notes,
    createdAt: row.createdAt.toISOString(),
    captureCount,
    conditions,
  };
}
