import { ApiProperty } from '@nestjs/swagger';
import { MEASURE_IDS, type MeasureId } from '@benchlark/dsp';
import { CALIBRATION_CHANNELS, type CalibrationChannel } from '../rig-calibration.entity';
import { EmbeddedCalibrationDto } from './calibration.dto';

export class LiveCalibrationDto {
  @ApiProperty({ format: 'uuid', description: 'To be sent as calibrationId' })
  id!: string;

  @ApiProperty({ enum: CALIBRATION_CHANNELS, enumName: 'CalibrationChannel' })
  channel!: CalibrationChannel;

  @ApiProperty()
  range!: string;

  @ApiProperty({ type: 'integer' })
  sampleRateHz!: number;

  @ApiProperty({ type: Number, nullable: true })
  loadOhm!: number | null;

  @ApiProperty({ format: 'date' })
  validUntil!: string;

  @ApiProperty({
    type: EmbeddedCalibrationDto,
    description: 'Goes into the settings as it is; of one channel, the other channel’s is joined to it',
  })
  calibration!: EmbeddedCalibrationDto;
}

export class LiveBaselineDto {
  @ApiProperty({ format: 'uuid', description: 'To be sent as baselineId' })
  id!: string;

  @ApiProperty({ format: 'uuid', description: 'The record it was taken from, with its traces' })
  recordId!: string;

  @ApiProperty({ enum: MEASURE_IDS, enumName: 'MeasureId' })
  measure!: MeasureId;

  @ApiProperty()
  inputRange!: string;

  @ApiProperty({ type: 'integer' })
  sampleRateHz!: number;

  @ApiProperty({ format: 'date-time' })
  createdAt!: string;

  @ApiProperty({
    type: 'object',
    additionalProperties: true,
    description: 'The record without its traces: goes into the settings as it is',
  })
  baseline!: Record<string, unknown>;
}

/** What the Live page may use of a rig today. */
export class LiveSettingsDto {
  @ApiProperty({ type: Number, nullable: true })
  limitDbfs!: number | null;

  @ApiProperty({ type: [LiveCalibrationDto], description: 'Of what is recorded' })
  inputs!: LiveCalibrationDto[];

  @ApiProperty({ type: [LiveCalibrationDto], description: 'Of what is played' })
  outputs!: LiveCalibrationDto[];

  @ApiProperty({ type: [LiveBaselineDto] })
  baselines!: LiveBaselineDto[];
}
