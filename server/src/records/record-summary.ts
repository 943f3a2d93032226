import type { MeasureId } from '@benchlark/dsp';
import type { RecordSummaryDto } from './dto/record-summary.dto';
import type { MainFigure } from './record.entity';

/** A record without its content, as one row. */
export interface SummaryRow {
  id: string;
  ordinal: number;
  measure: MeasureId;
  dspVersion: string;
  createdAt: Date;
  supersededById: string | null;
  supersedesId: string | null;
  mainFigure: MainFigure | null;
  warningCount: number;
  sketch: number[][];
  recognisedAs: string | null;
  stimulusName: string | null;
  fundamentalFrequencyHz: number | null;
  fundamentalLevelDbfs: number | null;
}

/** Expression and name of each column of SummaryRow; `r` is the record. */
export const SUMMARY_COLUMNS: readonly (readonly [string, keyof SummaryRow])[] = [
  ['r.id', 'id'],
  ['r.ordinal', 'ordinal'],
  ['r.measure', 'measure'],
  ['r.dsp_version', 'dspVersion'],
  ['r.created_at', 'createdAt'],
  ['(SELECT s.id FROM record AS s WHERE s.supersedes_id = r.id)', 'supersededById'],
  ['r.supersedes_id', 'supersedesId'],
  ['r.main_figure', 'mainFigure'],
  ['r.warning_count', 'warningCount'],
  ['r.sketch', 'sketch'],
  ['r.recognised_as', 'recognisedAs'],
  ['r.stimulus_name', 'stimulusName'],
  ['r.fundamental_frequency_hz', 'fundamentalFrequencyHz'],
  ['r.fundamental_level_dbfs', 'fundamentalLevelDbfs'],
];

export const SUMMARY_SELECT = SUMMARY_COLUMNS.map(([column, name]) => `${column} AS "${name}"`).join(', ');

export function toRecordSummary(row: SummaryRow): RecordSummaryDto {
  return {
    id: row.id,
    ordinal: row.ordinal,
    measure: row.measure,
    dspVersion: row.dspVersion,
    createdAt: row.createdAt.toISOString(),
    supersededById: row.supersededById,
    supersedesId: row.supersedesId,
    mainFigure: row.mainFigure,
    warningCount: row.warningCount,
    sketch: row.sketch,
    recognisedAs: row.recognisedAs,
    stimulusName: row.stimulusName,
    fundamentalFrequencyHz: row.fundamentalFrequencyHz,
    fundamentalLevelDbfs: row.fundamentalLevelDbfs,
  };
}
