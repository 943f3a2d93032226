import { ApiProperty } from '@nestjs/swagger';
import { ClearableNumberField, NameField, NotesField, ShortTextField } from '../../common/dto-rules';

export const RIG_CALIBRATION_STATES = ['none', 'valid', 'expired'] as const;
export type RigCalibrationState = (typeof RIG_CALIBRATION_STATES)[number];

export class RigDto {
  @ApiProperty({ format: 'uuid' })
  id!: string;

  @ApiProperty()
  name!: string;

  @ApiProperty()
  interface!: string;

  @ApiProperty()
  source!: string;

  @ApiProperty()
  cables!: string;

  @ApiProperty()
  supply!: string;

  @ApiProperty()
  load!: string;

  @ApiProperty({
    type: Number,
    nullable: true,
    description: 'The highest level that may be played on it, dBFS; null: no limit of its own',
  })
  limitDbfs!: number | null;

  @ApiProperty()
  notes!: string;

  @ApiProperty({ format: 'date-time' })
  createdAt!: string;

  @ApiProperty({ type: 'integer' })
  captureCount!: number;

  @ApiProperty({
    enum: RIG_CALIBRATION_STATES,
    enumName: 'RigCalibrationState',
    description: 'Of the input calibrations that are not retired',
  })
  calibrationState!: RigCalibrationState;

  @ApiProperty({
    type: String,
    format: 'date',
    nullable: true,
    description: 'The last day on which an input calibration holds',
  })
  calibratedUntil!: string | null;
}

export class RigListDto {
  @ApiProperty({ type: [RigDto] })
  items!: RigDto[];
}

class RigFactsDto {
  @ShortTextField()
  interface?: string;

  @ShortTextField()
  source?: string;

  @ShortTextField()
  cables?: string;

  @ShortTextField()
  supply?: string;

  @ShortTextField()
  load?: string;

  @ClearableNumberField({ minimum: -120, maximum: 0, description: 'dBFS; null: no limit of its own' })
  limitDbfs?: number | null;

  @NotesField()
  notes?: string;
}

export class CreateRigDto extends RigFactsDto {
  @NameField(120)
  name!: string;
}

export class UpdateRigDto extends RigFactsDto {
  @NameField(120, { isOptional: true })
  name?: string;
}
