import { ApiProperty, ApiPropertyOptional } from '@nestjs/swagger';
import { MEASURE_IDS, type MeasureId } from '@benchlark/dsp';
import { IsIn, IsInt, IsNumber, IsOptional, IsUUID, Max, Min } from 'class-validator';

const DAY_S = 86_400;
const RATE_MAX_HZ = 10_000_000;

export class RequestRecordDto {
  @ApiPropertyOptional({ enum: MEASURE_IDS, enumName: 'MeasureId', description: 'Left out: recognised' })
  @IsOptional()
  @IsIn(MEASURE_IDS)
  measure?: MeasureId;

  @ApiPropertyOptional({ type: Number, minimum: 0 })
  @IsOptional()
  @IsNumber({ allowNaN: false, allowInfinity: false })
  @Min(0)
  @Max(DAY_S)
  fromS?: number;

  @ApiPropertyOptional({ type: Number, minimum: 0 })
  @IsOptional()
  @IsNumber({ allowNaN: false, allowInfinity: false })
  @Min(0)
  @Max(DAY_S)
  toS?: number;

  @ApiPropertyOptional({ type: Number, minimum: 0 })
  @IsOptional()
  @IsNumber({ allowNaN: false, allowInfinity: false })
  @Min(0)
  @Max(RATE_MAX_HZ)
  bandLowHz?: number;

  @ApiPropertyOptional({ type: Number, minimum: 0 })
  @IsOptional()
  @IsNumber({ allowNaN: false, allowInfinity: false })
  @Min(0)
  @Max(RATE_MAX_HZ)
  bandHighHz?: number;

  @ApiPropertyOptional({ type: 'integer', minimum: 2, maximum: 100 })
  @IsOptional()
  @IsInt()
  @Min(2)
  @Max(100)
  highestHarmonic?: number;

  @ApiPropertyOptional({
    format: 'uuid',
    description: 'An input calibration of the recording’s rig; the record embeds it in full',
  })
  @IsOptional()
  @IsUUID()
  calibrationId?: string;

  @ApiPropertyOptional({
    format: 'uuid',
    description: 'A baseline of the recording’s rig; the record embeds it in full',
  })
  @IsOptional()
  @IsUUID()
  baselineId?: string;
}

export class RequestedRecordDto {
  @ApiProperty({ format: 'uuid' })
  jobId!: string;

  @ApiProperty({ description: 'False: the same analysis was asked for before' })
  isNew!: boolean;

  @ApiProperty({
    type: [String],
    description: 'What was accepted although it doesn’t fit the recording, in sentences',
  })
  notes!: readonly string[];
}
