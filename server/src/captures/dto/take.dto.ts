import { ApiProperty, ApiPropertyOptional } from '@nestjs/swagger';
import { MEASURE_IDS, type MeasureId } from '@benchlark/dsp';
import type { Take, TakeSettings } from '../take';

export class TakeEndDto {
  @ApiProperty()
  label!: string;

  @ApiProperty()
  sampleRateHz!: number;

  @ApiProperty({ type: 'integer' })
  channelCount!: number;

  @ApiPropertyOptional({ description: 'The grid that the samples sit on, in words' })
  resolution?: string;
}

export class TakeBreakDto {
  @ApiProperty()
  kind!: string;

  @ApiProperty()
  fromS!: number;

  @ApiProperty()
  toS!: number;
}

export class TakeNoteDto {
  @ApiProperty()
  atS!: number;

  @ApiProperty()
  text!: string;
}

export class TakeSeriesDto {
  @ApiProperty()
  id!: string;

  @ApiProperty({ type: 'integer' })
  index!: number;

  @ApiProperty({ type: 'integer' })
  count!: number;
}

/** How a take of the Live page was made. */
export class TakeDto implements Take {
  @ApiProperty({ enum: ['benchlark-take/1'] })
  schema!: 'benchlark-take/1';

  @ApiProperty()
  kind!: string;

  @ApiProperty({ enum: MEASURE_IDS, enumName: 'MeasureId' })
  measure!: MeasureId;

  @ApiProperty({
    type: 'object',
    additionalProperties: true,
    description: 'Of the first analysis; calibrationId and baselineId name those of the rig',
  })
  settings!: TakeSettings;

  @ApiProperty({ format: 'date-time' })
  startedAt!: string;

  @ApiProperty()
  isPractice!: boolean;

  @ApiProperty({ type: TakeEndDto })
  input!: TakeEndDto;

  @ApiProperty({ type: TakeEndDto })
  output!: TakeEndDto;

  @ApiProperty({ type: [TakeBreakDto] })
  breaks!: TakeBreakDto[];

  @ApiProperty({ type: [TakeNoteDto] })
  notes!: TakeNoteDto[];

  @ApiProperty({ type: TakeSeriesDto, nullable: true })
  series!: TakeSeriesDto | null;
}
