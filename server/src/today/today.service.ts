import { Injectable } from '@nestjs/common';
import { DataSource } from 'typeorm';
import { Conditions } from '../captures/capture-filter';
import { CaptureListService } from '../captures/capture-list.service';
import type { CountedCapturesDto, LogLineDto, TodayDto } from './dto/today.dto';

const SHOWN = 5;
const UNDER_WAY_SHOWN = 20;
const LOG_LINES = 12;

/** What waits for whom. */
@Injectable()
export class TodayService {
  constructor(
    private readonly captures: CaptureListService,
    private readonly dataSource: DataSource,
  ) {}

  async get(): Promise<TodayDto> {
    const [unsorted, failed, damaged, underWay, recent, log] = await Promise.all([
      this.counted('c.unit_id IS NULL'),
      this.counted(`c.state = 'failed'`),
      this.counted(`c.sha256 IN (SELECT sha256 FROM stored_object WHERE evidence <> 'sound')`),
      this.captures.newest(matching(`c.state IN ('queued', 'analysing')`), UNDER_WAY_SHOWN),
      this.captures.newest(matching(`c.state = 'done'`), SHOWN),
      this.log(),
    ]);
    return { unsorted, failed, underWay: { items: underWay }, recent: { items: recent }, damaged, log };
  }

  private async counted(condition: string): Promise<CountedCapturesDto> {
    const where = matching(condition);
    const [count, captures] = await Promise.all([
      this.captures.count(where),
      this.captures.newest(where, SHOWN),
    ]);
    return { count, captures };
  }

  /** The latest things that happened to captures, newest first. */
  private async log(): Promise<LogLineDto[]> {
    const rows = await this.dataSource.query<(Omit<LogLineDto, 'at'> & { at: Date })[]>(
      `SELECT * FROM (
         (SELECT c.uploaded_at AS at, 'archived ' || c.file_name || ' as #' || c.number AS text, c.id AS "captureId",
            p.display_name AS "actorName"
          FROM capture AS c JOIN person AS p ON p.id = c.uploaded_by ORDER BY c.number DESC LIMIT $1)
         UNION ALL
         (SELECT r.created_at, 'measured #' || c.number || ' (' || r.measure || ', record ' || r.ordinal || ')', c.id, NULL
          FROM record AS r JOIN capture AS c ON c.id = r.capture_id ORDER BY r.created_at DESC LIMIT $1)
         UNION ALL
         (SELECT j.ended_at, 'could not measure #' || c.number || ': ' || j.failure_message, c.id, NULL
          FROM analysis_job AS j JOIN capture AS c ON c.id = j.capture_id
          WHERE j.state = 'failed' ORDER BY j.ended_at DESC LIMIT $1)
       ) AS lines ORDER BY at DESC LIMIT $1`,
      [LOG_LINES],
    );
    return rows.map(({ at, ...line }) => ({ at: at.toISOString(), ...line }));
  }
}

function matching(condition: string): Conditions {
  const where = new Conditions();
  where.add(condition);
  return where;
}
