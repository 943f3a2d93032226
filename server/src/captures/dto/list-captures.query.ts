import { ApiPropertyOptional } from '@nestjs/swagger';
import { MEASURE_IDS, type MeasureId } from '@benchlark/dsp';
import { IsIn, IsISO8601, IsOptional, IsUUID } from 'class-validator';
import { CursorQuery, FlagQuery, LimitQuery, SearchQuery } from '../../common/dto-rules';
import { CAPTURE_STATES, type CaptureState } from '../capture.entity';

export const CAPTURE_SORTS = [
  'number',
  'uploadedAt',
  'fileName',
  'sizeBytes',
  'durationS',
  'unit',
  'measure',
] as const;
export type CaptureSort = (typeof CAPTURE_SORTS)[number];

export class ListCapturesQuery {
  @SearchQuery()
  q?: string;

  @ApiPropertyOptional({ format: 'uuid' })
  @IsOptional()
  @IsUUID()
  unitId?: string;

  @FlagQuery('Only captures that belong to no unit yet')
  unsorted?: boolean;

  @ApiPropertyOptional({ format: 'uuid' })
  @IsOptional()
  @IsUUID()
  conditionId?: string;

  @ApiPropertyOptional({ format: 'uuid' })
  @IsOptional()
  @IsUUID()
  rigId?: string;

  @ApiPropertyOptional({ enum: MEASURE_IDS, enumName: 'MeasureId' })
  @IsOptional()
  @IsIn(MEASURE_IDS)
  measure?: MeasureId;

  @ApiPropertyOptional({ enum: CAPTURE_STATES, enumName: 'CaptureState' })
  @IsOptional()
  @IsIn(CAPTURE_STATES)
  state?: CaptureState;

  @FlagQuery('Only captures whose file or current record carries a warning')
  hasWarnings?: boolean;

  @ApiPropertyOptional({ format: 'date-time', description: 'Uploaded at or after' })
  @IsOptional()
  @IsISO8601({ strict: true })
  since?: string;

  @ApiPropertyOptional({ format: 'date-time', description: 'Uploaded before' })
  @IsOptional()
  @IsISO8601({ strict: true })
  until?: string;

  @ApiPropertyOptional({ enum: CAPTURE_SORTS, enumName: 'CaptureSort', default: 'number' })
  @IsOptional()
  @IsIn(CAPTURE_SORTS)
  sort?: CaptureSort;

  @ApiPropertyOptional({ enum: ['asc', 'desc'], enumName: 'SortOrder', default: 'desc' })
  @IsOptional()
  @IsIn(['asc', 'desc'])
  order?: 'asc' | 'desc';

  @LimitQuery(50)
  limit?: number;

  @CursorQuery()
  cursor?: string;
}
