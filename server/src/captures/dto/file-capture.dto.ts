import { ApiProperty, ApiPropertyOptional } from '@nestjs/swagger';
import { IsOptional, IsString } from 'class-validator';
import { ClearableIdField, FormIdField, NotesField } from '../../common/dto-rules';

const NOTE_LENGTH_MAX = 2_000;

/** Under what a capture is filed; null takes it out again. */
export class FileCaptureDto {
  @ClearableIdField()
  unitId?: string | null;

  @ClearableIdField()
  conditionId?: string | null;

  @ClearableIdField()
  rigId?: string | null;

  @NotesField(NOTE_LENGTH_MAX)
  note?: string;
}

/** The text fields of an upload. */
export class UploadFieldsDto {
  @FormIdField()
  unitId?: string;

  @FormIdField()
  conditionId?: string;

  @FormIdField()
  rigId?: string;

  @NotesField(NOTE_LENGTH_MAX)
  note?: string;

  @ApiPropertyOptional({
    type: String,
    description:
      'JSON, benchlark-take/1: how a take of the Live page was made, and what its first analysis measures',
  })
  @IsOptional()
  @IsString()
  take?: string;
}

/** An upload as the document describes it. */
export class UploadCaptureDto extends UploadFieldsDto {
  @ApiProperty({ type: 'string', format: 'binary', description: 'The WAV file; the last field of the form' })
  file!: unknown;
}
