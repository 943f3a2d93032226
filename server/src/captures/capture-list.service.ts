import { Injectable } from '@nestjs/common';
import { DataSource } from 'typeorm';
import { AppError } from '../common/app-error';
import { readCursor, writeCursor } from '../common/cursor';
import { captureConditions, Conditions, SORT_EXPRESSIONS } from './capture-filter';
import { CAPTURE_COLUMNS, CAPTURE_JOINS, toCaptureDto, type JoinedCaptureRow } from './capture-row';
import type { CaptureDto, CaptureListDto } from './dto/capture.dto';
import type { ListCapturesQuery } from './dto/list-captures.query';

const PAGE_LENGTH = 50;

/** Reads captures; every list of them comes from here. */
@Injectable()
export class CaptureListService {
  constructor(private readonly dataSource: DataSource) {}

  async list(query: ListCapturesQuery): Promise<CaptureListDto> {
    const where = captureConditions(query);
    const [page, total, all] = await Promise.all([
      this.readPage(query),
      where.isEmpty ? null : this.count(where),
      this.dataSource.query<{ count: number; bytes: string }[]>(
        'SELECT count(*)::integer AS count, coalesce(sum(size_bytes), 0) AS bytes FROM capture',
      ),
    ]);
    const totalAll = all[0]?.count ?? 0;
    return { ...page, total: total ?? totalAll, totalAll, totalBytes: Number(all[0]?.bytes ?? 0) };
  }

  async count(where: Conditions): Promise<number> {
    const rows = await this.dataSource.query<{ count: number }[]>(
      `SELECT count(*)::integer AS count FROM capture AS c WHERE ${where.toString()}`,
      where.values,
    );
    return rows[0]?.count ?? 0;
  }

  /** @throws AppError NOT_FOUND */
  async get(id: string): Promise<CaptureDto> {
    const rows = await this.dataSource.query<JoinedCaptureRow[]>(
      `SELECT ${CAPTURE_COLUMNS} FROM capture AS c ${CAPTURE_JOINS} WHERE c.id = $1`,
      [id],
    );
    const [row] = rows;
    if (!row) throw new AppError('NOT_FOUND');
    return toCaptureDto(row);
  }

  /** The newest captures that a condition lets through. */
  async newest(where: Conditions, limit: number): Promise<CaptureDto[]> {
    const rows = await this.dataSource.query<JoinedCaptureRow[]>(
      `SELECT ${CAPTURE_COLUMNS} FROM capture AS c ${CAPTURE_JOINS}
       WHERE ${where.toString()} ORDER BY c.number DESC LIMIT ${limit}`,
      where.values,
    );
    return rows.map(toCaptureDto);
  }

  /**
   * One page by keyset: the sort value and the number of the last row say where the next page begins, so that a page far
   * down costs what the first does.
   */
  private async readPage(query: ListCapturesQuery): Promise<Pick<CaptureListDto, 'items' | 'nextCursor'>> {
    const { sort = 'number', order = 'desc', limit = PAGE_LENGTH, cursor } = query;
    const { sql, type, shape } = SORT_EXPRESSIONS[sort];
    const orderName = `${sort} ${order}`;
    const where = captureConditions(query);
    if (cursor !== undefined) {
      const after = readCursor(cursor, orderName, (value, tie) => shape.test(value) && /^\d{1,9}$/.test(tie));
      const sign = order === 'asc' ? '>' : '<';
      where.add(`(${sql}, c.number) ${sign} (?::${type}, ?::integer)`, after.value, after.tie);
    }
    // The page's ids first: the joins then run for these rows alone.
    const rows = await this.dataSource.query<(JoinedCaptureRow & { sortValue: string })[]>(
      `SELECT ${CAPTURE_COLUMNS}, page.sort_value AS "sortValue" FROM (
         SELECT c.id, (${sql})::text AS sort_value FROM capture AS c WHERE ${where.toString()}
         ORDER BY ${sql} ${order}, c.number ${order} LIMIT ${limit + 1}
       ) AS page JOIN capture AS c ON c.id = page.id ${CAPTURE_JOINS}
       ORDER BY ${sql} ${order}, c.number ${order}`,
      where.values,
    );
    const last = rows.length > limit ? rows[limit - 1] : undefined;
    return {
      items: rows.slice(0, limit).map(toCaptureDto),
      nextCursor: last
        ? writeCursor({ order: orderName, value: last.sortValue, tie: String(last.number) })
        : null,
    };
  }
}
