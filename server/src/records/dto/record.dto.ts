import { ApiProperty } from '@nestjs/swagger';
import { EVIDENCE_STATES, type Evidence } from '../../storage/stored-object.entity';
import { RecordSummaryDto } from './record-summary.dto';

export class RecordDto extends RecordSummaryDto {
  @ApiProperty({ format: 'uuid' })
  captureId!: string;

  @ApiProperty({ description: 'False once a newer record superseded it' })
  isCurrent!: boolean;

  @ApiProperty({
    type: 'object',
    additionalProperties: true,
    description: 'The record; each of its traces is { href, points, xUnit, yUnit }',
  })
  record!: Record<string, unknown>;
}

export class DifferenceDto {
  @ApiProperty({ example: 'channels.0.figures.thdDb' })
  path!: string;

  @ApiProperty({ description: 'Number, text or null', type: 'string', nullable: true })
  stored!: string | number | null;

  @ApiProperty({ description: 'Number, text or null', type: 'string', nullable: true })
  computed!: string | number | null;
}

export class VerificationDto {
  @ApiProperty()
  isEqual!: boolean;

  @ApiProperty({ type: [DifferenceDto] })
  differing!: DifferenceDto[];

  @ApiProperty({ enum: EVIDENCE_STATES, enumName: 'Evidence' })
  evidence!: Evidence;

  @ApiProperty({ description: 'The version that computed the figures again' })
  dspVersion!: string;
}
