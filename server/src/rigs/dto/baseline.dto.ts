import { ApiProperty } from '@nestjs/swagger';
import { MEASURE_IDS, type MeasureId } from '@benchlark/dsp';
import { IsUUID } from 'class-validator';
import { NameField } from '../../common/dto-rules';
import { NamedPersonDto } from './named-person.dto';

export class CreateBaselineDto {
  @ApiProperty({ format: 'uuid', description: 'Its newest record becomes the baseline' })
  @IsUUID()
  captureId!: string;

  @NameField(120)
  inputRange!: string;
}

export class BaselineDto {
  @ApiProperty({ format: 'uuid' })
  id!: string;

  @ApiProperty({ format: 'uuid' })
  captureId!: string;

  @ApiProperty({ type: 'integer' })
  captureNumber!: number;

  @ApiProperty({ format: 'uuid' })
  recordId!: string;

  @ApiProperty({ enum: MEASURE_IDS, enumName: 'MeasureId' })
  measure!: MeasureId;

  @ApiProperty({ description: 'The capture was analysed again since; the baseline stays what it was' })
  hasNewerRecord!: boolean;

  @ApiProperty()
  inputRange!: string;

  @ApiProperty({ type: 'integer' })
  sampleRateHz!: number;

  @ApiProperty({ format: 'date-time' })
  createdAt!: string;

  @ApiProperty({ type: NamedPersonDto })
  createdBy!: NamedPersonDto;

  @ApiProperty({ type: String, format: 'date-time', nullable: true })
  retiredAt!: string | null;
}

export class BaselineListDto {
  @ApiProperty({ type: [BaselineDto] })
  items!: BaselineDto[];
}
