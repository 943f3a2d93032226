import { ApiProperty, ApiPropertyOptional } from '@nestjs/swagger';
import { CaptureDto } from '../../captures/dto/capture.dto';

export class CountedCapturesDto {
  @ApiProperty({ type: 'integer' })
  count!: number;

  @ApiProperty({ type: [CaptureDto], description: 'The latest five' })
  captures!: CaptureDto[];
}

export class CapturesDto {
  @ApiProperty({ type: [CaptureDto] })
  items!: CaptureDto[];
}

export class LogLineDto {
  @ApiProperty({ format: 'date-time' })
  at!: string;

  @ApiProperty()
  text!: string;

  @ApiPropertyOptional({ format: 'uuid' })
  captureId?: string;

  @ApiProperty({ type: String, nullable: true, description: 'Null: the program itself' })
  actorName!: string | null;
}

export class TodayDto {
  @ApiProperty({ type: CountedCapturesDto })
  unsorted!: CountedCapturesDto;

  @ApiProperty({ type: CountedCapturesDto })
  failed!: CountedCapturesDto;

  @ApiProperty({ type: CapturesDto })
  underWay!: CapturesDto;

  @ApiProperty({ type: CapturesDto })
  recent!: CapturesDto;

  @ApiProperty({ type: CountedCapturesDto })
  damaged!: CountedCapturesDto;

  @ApiProperty({ type: [LogLineDto] })
  log!: LogLineDto[];
}
