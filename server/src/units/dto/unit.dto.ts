import { ApiProperty } from '@nestjs/swagger';
import { UNIT_KINDS, type UnitKind } from '../unit.entity';

export class ConditionDto {
  @ApiProperty({ format: 'uuid' })
  id!: string;

  @ApiProperty()
  name!: string;

  @ApiProperty()
  notes!: string;

  @ApiProperty({ type: String, format: 'date', nullable: true })
  startedOn!: string | null;

  @ApiProperty({ type: 'integer' })
  captureCount!: number;
}

export class UnitDto {
  @ApiProperty({ format: 'uuid' })
  id!: string;

  @ApiProperty()
  maker!: string;

  @ApiProperty()
  model!: string;

  @ApiProperty({ type: String, nullable: true })
  serialNumber!: string | null;

  @ApiProperty({ enum: UNIT_KINDS, enumName: 'UnitKind' })
  kind!: UnitKind;

  @ApiProperty()
  notes!: string;

  @ApiProperty({ format: 'date-time' })
  createdAt!: string;

  @ApiProperty({ type: 'integer' })
  captureCount!: number;

  @ApiProperty({ type: [ConditionDto] })
  conditions!: ConditionDto[];
}

export class UnitDetailDto extends UnitDto {
  @ApiProperty({ type: 'integer', description: 'Captures of the unit that no condition was given for' })
  captureCountWithoutCondition!: number;

  @ApiProperty({ type: String, format: 'date-time', nullable: true })
  lastCaptureAt!: string | null;
}

export class UnitListDto {
  @ApiProperty({ type: [UnitDto] })
  items!: UnitDto[];

  @ApiProperty({ type: String, nullable: true })
  nextCursor!: string | null;

  @ApiProperty({ type: 'integer' })
  total!: number;
}
