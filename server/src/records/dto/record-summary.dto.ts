import { ApiProperty } from '@nestjs/swagger';
import { MEASURE_IDS, type MeasureId } from '@benchlark/dsp';

export class MainFigureDto {
  @ApiProperty({ example: 'thdPlusNoiseDb' })
  key!: string;

  @ApiProperty()
  value!: number;

  @ApiProperty({ example: 'dB' })
  unit!: string;

  @ApiProperty({ example: 'left' })
  channel!: string;

  @ApiProperty({ type: String, nullable: true, description: 'What limits the figure, where something does' })
  limitBy!: string | null;

  @ApiProperty({ type: Number, nullable: true })
  marginDb!: number | null;
}

export class RecordSummaryDto {
  @ApiProperty({ format: 'uuid' })
  id!: string;

  @ApiProperty({ type: 'integer', description: '1, 2, 3 … in the capture' })
  ordinal!: number;

  @ApiProperty({ enum: MEASURE_IDS, enumName: 'MeasureId' })
  measure!: MeasureId;

  @ApiProperty()
  dspVersion!: string;

  @ApiProperty({ format: 'date-time' })
  createdAt!: string;

  @ApiProperty({ type: String, format: 'uuid', nullable: true })
  supersededById!: string | null;

  @ApiProperty({ type: String, format: 'uuid', nullable: true })
  supersedesId!: string | null;

  @ApiProperty({ type: MainFigureDto, nullable: true })
  mainFigure!: MainFigureDto | null;

  @ApiProperty({ type: 'integer' })
  warningCount!: number;

  @ApiProperty({
    type: 'array',
    items: { type: 'array', items: { type: 'number' } },
    description: 'For a small drawing: 64 values from 0 to 1 a channel',
  })
  sketch!: number[][];

  @ApiProperty({ type: String, nullable: true, description: 'What the recording was taken for, and why' })
  recognisedAs!: string | null;

  @ApiProperty({ type: String, nullable: true })
  stimulusName!: string | null;

  @ApiProperty({ type: Number, nullable: true })
  fundamentalFrequencyHz!: number | null;

  @ApiProperty({ type: Number, nullable: true })
  fundamentalLevelDbfs!: number | null;
}

export class RecordListDto {
  @ApiProperty({ type: [RecordSummaryDto] })
  items!: RecordSummaryDto[];
}
