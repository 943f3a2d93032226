import { ApiProperty, ApiPropertyOptional } from '@nestjs/swagger';
import { HIGHEST_RATE_HZ, LOWEST_RATE_HZ, type Calibration } from '@benchlark/dsp';
import { IsIn, IsInt, IsOptional, Max, Min } from 'class-validator';
import { NamedPersonDto } from './named-person.dto';
import { ClearableNumberField, DateField, NameField, NotesField, NumberField } from '../../common/dto-rules';
import {
  CALIBRATION_CHANNELS,
  CALIBRATION_DIRECTIONS,
  type CalibrationChannel,
  type CalibrationDirection,
} from '../rig-calibration.entity';
import { CALIBRATION_STATES, type CalibrationState } from '../calibration-state';

const VOLTS_MAX = 10_000;
const VOLTS_MIN = 1e-6;
const DIVIDER_MAX = 10_000;

export class CreateCalibrationDto {
  @ApiProperty({ enum: CALIBRATION_CHANNELS, enumName: 'CalibrationChannel' })
  @IsIn(CALIBRATION_CHANNELS)
  channel!: CalibrationChannel;

  @ApiProperty({ enum: CALIBRATION_DIRECTIONS, enumName: 'CalibrationDirection' })
  @IsIn(CALIBRATION_DIRECTIONS)
  direction!: CalibrationDirection;

  @NameField(120)
  range!: string;

  @ApiProperty({ type: 'integer', minimum: LOWEST_RATE_HZ, maximum: HIGHEST_RATE_HZ })
  @IsInt()
  @Min(LOWEST_RATE_HZ)
  @Max(HIGHEST_RATE_HZ)
  sampleRateHz!: number;

  @NumberField({ minimum: 1, maximum: 200_000, description: 'Of the tone it was made with' })
  frequencyHz!: number;

  @NumberField({
    minimum: VOLTS_MIN,
    maximum: VOLTS_MAX,
    description: 'At the interface’s own terminals, for a sine of 0 dBFS',
  })
  voltsRmsAtFullScale!: number;

  @ApiPropertyOptional({
    type: Number,
    minimum: 1,
    maximum: DIVIDER_MAX,
    default: 1,
    description: 'Of a divider between unit and interface; 1: none',
  })
  @IsOptional()
  @Min(1)
  @Max(DIVIDER_MAX)
  dividerRatio?: number;

  @ClearableNumberField({ minimum: 0.1, maximum: 1e9 })
  loadOhm?: number | null;

  @NameField(120)
  meter!: string;

  @NumberField({ minimum: 0, maximum: 50, description: 'Expanded, k = 2: of the meter and the divider' })
  meterUncertaintyPercent!: number;

  @DateField()
  takenOn!: string;

  @DateField('The last day on which it holds')
  validUntil!: string;

  @NotesField()
  notes?: string;
}

export class CalibrationDto {
  @ApiProperty({ format: 'uuid' })
  id!: string;

  @ApiProperty({ format: 'uuid' })
  rigId!: string;

  @ApiProperty({ enum: CALIBRATION_CHANNELS, enumName: 'CalibrationChannel' })
  channel!: CalibrationChannel;

  @ApiProperty({ enum: CALIBRATION_DIRECTIONS, enumName: 'CalibrationDirection' })
  direction!: CalibrationDirection;

  @ApiProperty()
  range!: string;

  @ApiProperty({ type: 'integer' })
  sampleRateHz!: number;

  @ApiProperty()
  frequencyHz!: number;

  @ApiProperty()
  voltsRmsAtFullScale!: number;

  @ApiProperty()
  dividerRatio!: number;

  @ApiProperty({ description: 'At the unit, for a sine of 0 dBFS: the divider is counted in' })
  fullScaleVrms!: number;

  @ApiProperty({ type: Number, nullable: true })
  loadOhm!: number | null;

  @ApiProperty()
  meter!: string;

  @ApiProperty()
  meterUncertaintyPercent!: number;

  @ApiProperty({ format: 'date' })
  takenOn!: string;

  @ApiProperty({ format: 'date' })
  validUntil!: string;

  @ApiProperty()
  notes!: string;

  @ApiProperty({ format: 'date-time' })
  createdAt!: string;

  @ApiProperty({ type: NamedPersonDto })
  createdBy!: NamedPersonDto;

  @ApiProperty({ enum: CALIBRATION_STATES, enumName: 'CalibrationState' })
  state!: CalibrationState;

  @ApiProperty({ description: 'A newer one was made for the same channel, direction, range and rate' })
  isFollowed!: boolean;

  @ApiProperty({ type: String, format: 'date-time', nullable: true })
  retiredAt!: string | null;
}

export class CalibrationListDto {
  @ApiProperty({ type: [CalibrationDto] })
  items!: CalibrationDto[];
}

export class CalibratedChannelDto {
  @ApiProperty({ example: 'left' })
  channel!: string;

  @ApiProperty()
  fullScaleVrms!: number;

  @ApiProperty({ description: 'k = 2' })
  expandedPercent!: number;
}

/** A calibration as the settings of an analysis embed it. */
export class EmbeddedCalibrationDto implements Calibration {
  @ApiProperty({ enum: ['benchlark-calibration/1'] })
  schema!: 'benchlark-calibration/1';

  @ApiProperty({ format: 'date' })
  date!: string;

  @ApiProperty({ type: 'integer' })
  sampleRateHz!: number;

  @ApiProperty()
  inputRange!: string;

  @ApiProperty({ type: [CalibratedChannelDto] })
  channels!: CalibratedChannelDto[];
}
