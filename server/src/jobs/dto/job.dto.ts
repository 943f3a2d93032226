import { ApiProperty, ApiPropertyOptional } from '@nestjs/swagger';
import { IsIn, IsOptional } from 'class-validator';
import { FailureDto } from '../../captures/dto/capture.dto';
import { LimitQuery } from '../../common/dto-rules';
import { JOB_STATES, type JobState } from '../analysis-job.entity';

export class ListJobsQuery {
  @ApiPropertyOptional({ enum: JOB_STATES, enumName: 'JobState' })
  @IsOptional()
  @IsIn(JOB_STATES)
  state?: JobState;

  @LimitQuery(100)
  limit?: number;
}

export class JobDto {
  @ApiProperty({ format: 'uuid' })
  id!: string;

  @ApiProperty({ enum: ['analysis'], enumName: 'JobKind' })
  kind!: 'analysis';

  @ApiProperty({ format: 'uuid' })
  captureId!: string;

  @ApiProperty({ type: 'integer' })
  captureNumber!: number;

  @ApiProperty({ enum: JOB_STATES, enumName: 'JobState' })
  state!: JobState;

  @ApiProperty({ minimum: 0, maximum: 1 })
  progress!: number;

  @ApiProperty({ type: 'integer' })
  attempts!: number;

  @ApiProperty({ type: 'integer' })
  maxAttempts!: number;

  @ApiProperty({ type: FailureDto, nullable: true })
  failure!: FailureDto | null;

  @ApiProperty({ format: 'date-time' })
  createdAt!: string;

  @ApiProperty({ type: String, format: 'date-time', nullable: true })
  startedAt!: string | null;

  @ApiProperty({ type: String, format: 'date-time', nullable: true })
  endedAt!: string | null;
}

export class JobListDto {
  @ApiProperty({ type: [JobDto] })
  items!: JobDto[];
}
