import type { MeasureId } from '@benchlark/dsp';
import type { MainFigure } from '../records/record.entity';
import { SUMMARY_COLUMNS, toRecordSummary, type SummaryRow } from '../records/record-summary';
import type { JobState } from '../jobs/analysis-job.entity';
import type { Evidence } from '../storage/stored-object.entity';
import type { CaptureState, FileWarning } from './capture.entity';
import type { CaptureDto } from './dto/capture.dto';
import type { Take } from './take';

/** A capture with all it belongs to, as one row. */
export interface CaptureRow {
  id: string;
  number: number;
  fileName: string;
  sizeBytes: string;
  sha256: string;
  uploadedAt: Date;
  uploadedBy: { id: string; displayName: string };
  note: string;
  unit: CaptureDto['unit'];
  condition: CaptureDto['condition'];
  rig: CaptureDto['rig'];
  sampleRateHz: number;
  channelCount: number;
  bitsPerSample: number;
  sampleFormat: 'integer' | 'float';
  frameCount: string;
  durationS: number;
  fileWarnings: FileWarning[];
  take: Take | null;
  isPractice: boolean;
  sameBytesAs: { id: string; number: number }[];
  evidence: Evidence;
  checkedAt: Date | null;
  state: CaptureState;
  jobId: string | null;
  jobState: JobState | null;
  progress: number | null;
  attempts: number | null;
  failureCode: string | null;
  failureMessage: string | null;
  recordId: string | null;
}

type JoinedSummary = Record<`r_${keyof SummaryRow}`, unknown>;
export type JoinedCaptureRow = CaptureRow & JoinedSummary;

const named = (table: string) =>
  `CASE WHEN ${table}.id IS NOT NULL THEN json_build_object('id', ${table}.id, 'name', ${table}.name) END`;

/** Columns of CaptureRow and, prefixed with `r_`, of the current record's summary; `c` is the capture. */
export const CAPTURE_COLUMNS = `
  c.id, c.number, c.file_name AS "fileName", c.size_bytes AS "sizeBytes", c.sha256, c.uploaded_at AS "uploadedAt",
  json_build_object('id', p.id, 'displayName', p.display_name) AS "uploadedBy", c.note,
  CASE WHEN u.id IS NOT NULL THEN json_build_object(
    'id', u.id, 'maker', u.maker, 'model', u.model, 'serialNumber', u.serial_number) END AS unit,
  ${named('k')} AS condition, ${named('g')} AS rig,
  c.sample_rate_hz AS "sampleRateHz", c.channel_count AS "channelCount", c.bits_per_sample AS "bitsPerSample",
  c.sample_format AS "sampleFormat", c.frame_count AS "frameCount", c.duration_s AS "durationS",
  c.file_warnings AS "fileWarnings", c.take, c.is_practice AS "isPractice", o.evidence, o.checked_at AS "checkedAt", c.state, c.job_id AS "jobId",
  (SELECT coalesce(json_agg(json_build_object('id', t.id, 'number', t.number) ORDER BY t.number), '[]')
    FROM capture AS t WHERE t.sha256 = c.sha256 AND t.id <> c.id) AS "sameBytesAs",
  j.state AS "jobState", j.progress, j.attempts, j.failure_code AS "failureCode",
  j.failure_message AS "failureMessage", c.record_id AS "recordId",
  ${SUMMARY_COLUMNS.map(([column, name]) => `${column} AS "r_${name}"`).join(', ')}`;

export const CAPTURE_JOINS = `
  JOIN person AS p ON p.id = c.uploaded_by
  JOIN stored_object AS o ON o.sha256 = c.sha256
  LEFT JOIN unit AS u ON u.id = c.unit_id
  LEFT JOIN unit_condition AS k ON k.id = c.condition_id
  LEFT JOIN rig AS g ON g.id = c.rig_id
  LEFT JOIN analysis_job AS j ON j.id = c.job_id
  LEFT JOIN record AS r ON r.id = c.record_id`;

export function toCaptureDto(row: JoinedCaptureRow): CaptureDto {
  const isUnderWay = row.state === 'queued' || row.state === 'analysing';
  return {
    id: row.id,
    number: row.number,
    fileName: row.fileName,
    sizeBytes: Number(row.sizeBytes),
    sha256: row.sha256,
    uploadedAt: row.uploadedAt.toISOString(),
    uploadedBy: row.uploadedBy,
    note: row.note,
    unit: row.unit,
    condition: row.condition,
    rig: row.rig,
    sampleRateHz: row.sampleRateHz,
    channelCount: row.channelCount,
    bitsPerSample: row.bitsPerSample,
    sampleFormat: row.sampleFormat,
    frameCount: Number(row.frameCount),
    durationS: row.durationS,
    fileWarnings: row.fileWarnings,
    take: row.take,
    isPractice: row.isPractice,
    sameBytesAs: row.sameBytesAs,
    evidence: row.evidence,
    checkedAt: row.checkedAt?.toISOString() ?? null,
    state: row.state,
    progress: isUnderWay ? (row.progress ?? 0) : null,
    failure:
      row.failureCode === null
        ? null
        : { code: row.failureCode, message: row.failureMessage ?? '', attempts: row.attempts ?? 0 },
    jobId: row.jobId,
    record: row.recordId === null ? null : toRecordSummary(joinedSummary(row)),
  };
}

function joinedSummary(row: JoinedCaptureRow): SummaryRow {
  const { r_measure, r_mainFigure } = row;
  const entries = SUMMARY_COLUMNS.map(([, name]) => [name, row[`r_${name}`]] as const);
  const summary = Object.fromEntries(entries) as unknown as SummaryRow; // the columns above, name by name
  return { ...summary, measure: r_measure as MeasureId, mainFigure: r_mainFigure as MainFigure | null };
}
