import { ApiProperty } from '@nestjs/swagger';
import { RecordSummaryDto } from '../../records/dto/record-summary.dto';
import { EVIDENCE_STATES, type Evidence } from '../../storage/stored-object.entity';
import { TakeDto } from './take.dto';
import { CAPTURE_STATES, type CaptureState } from '../capture.entity';

export class UploaderDto {
  @ApiProperty({ format: 'uuid' })
  id!: string;

  @ApiProperty()
  displayName!: string;
}

export class CaptureUnitDto {
  @ApiProperty({ format: 'uuid' })
  id!: string;

  @ApiProperty()
  maker!: string;

  @ApiProperty()
  model!: string;

  @ApiProperty({ type: String, nullable: true })
  serialNumber!: string | null;
}

export class NamedDto {
  @ApiProperty({ format: 'uuid' })
  id!: string;

  @ApiProperty()
  name!: string;
}

export class FileWarningDto {
  @ApiProperty()
  code!: string;

  @ApiProperty()
  message!: string;
}

export class CaptureLinkDto {
  @ApiProperty({ format: 'uuid' })
  id!: string;

  @ApiProperty({ type: 'integer' })
  number!: number;
}

export class FailureDto {
  @ApiProperty()
  code!: string;

  @ApiProperty()
  message!: string;

  @ApiProperty({ type: 'integer' })
  attempts!: number;
}

export class CaptureDto {
  @ApiProperty({ format: 'uuid' })
  id!: string;

  @ApiProperty({ type: 'integer' })
  number!: number;

  @ApiProperty()
  fileName!: string;

  @ApiProperty({ type: 'integer' })
  sizeBytes!: number;

  @ApiProperty()
  sha256!: string;

  @ApiProperty({ format: 'date-time' })
  uploadedAt!: string;

  @ApiProperty({ type: UploaderDto })
  uploadedBy!: UploaderDto;

  @ApiProperty()
  note!: string;

  @ApiProperty({ type: CaptureUnitDto, nullable: true })
  unit!: CaptureUnitDto | null;

  @ApiProperty({ type: NamedDto, nullable: true })
  condition!: NamedDto | null;

  @ApiProperty({ type: NamedDto, nullable: true })
  rig!: NamedDto | null;

  @ApiProperty({ type: 'integer' })
  sampleRateHz!: number;

  @ApiProperty({ type: 'integer' })
  channelCount!: number;

  @ApiProperty({ type: 'integer' })
  bitsPerSample!: number;

  @ApiProperty({ enum: ['integer', 'float'], enumName: 'SampleFormat' })
  sampleFormat!: 'integer' | 'float';

  @ApiProperty({ type: 'integer' })
  frameCount!: number;

  @ApiProperty()
  durationS!: number;

  @ApiProperty({ type: [FileWarningDto] })
  fileWarnings!: FileWarningDto[];

  @ApiProperty({ type: TakeDto, nullable: true, description: 'Null for an upload' })
  take!: TakeDto | null;

  @ApiProperty({ description: 'A practice device was recorded, no real unit' })
  isPractice!: boolean;

  @ApiProperty({ type: [CaptureLinkDto], description: 'Other captures of the very same bytes' })
  sameBytesAs!: CaptureLinkDto[];

  @ApiProperty({ enum: EVIDENCE_STATES, enumName: 'Evidence' })
  evidence!: Evidence;

  @ApiProperty({ type: String, format: 'date-time', nullable: true })
  checkedAt!: string | null;

  @ApiProperty({ enum: CAPTURE_STATES, enumName: 'CaptureState' })
  state!: CaptureState;

  @ApiProperty({ type: Number, nullable: true, minimum: 0, maximum: 1 })
  progress!: number | null;

  @ApiProperty({ type: FailureDto, nullable: true })
  failure!: FailureDto | null;

  @ApiProperty({
    type: String,
    format: 'uuid',
    nullable: true,
    description: 'The latest analysis that was asked for',
  })
  jobId!: string | null;

  @ApiProperty({ type: RecordSummaryDto, nullable: true })
  record!: RecordSummaryDto | null;
}

export class CaptureListDto {
  @ApiProperty({ type: [CaptureDto] })
  items!: CaptureDto[];

  @ApiProperty({ type: String, nullable: true })
  nextCursor!: string | null;

  @ApiProperty({ type: 'integer', description: 'Captures that the filter lets through' })
  total!: number;

  @ApiProperty({ type: 'integer', description: 'All captures' })
  totalAll!: number;

  @ApiProperty({ type: 'integer', description: 'Bytes of all captures' })
  totalBytes!: number;
}

export class OverviewChannelDto {
  @ApiProperty({ type: [Number] })
  min!: number[];

  @ApiProperty({ type: [Number] })
  max!: number[];
}

export class OverviewDto {
  @ApiProperty({ type: 'integer' })
  framesPerBin!: number;

  @ApiProperty({ type: [OverviewChannelDto] })
  channels!: OverviewChannelDto[];
}
