import { ApiPropertyOptional } from '@nestjs/swagger';
import { IsIn, IsOptional } from 'class-validator';
import {
  ClearableDateField,
  ClearableNameField,
  CursorQuery,
  LimitQuery,
  NameField,
  NotesField,
  SearchQuery,
} from '../../common/dto-rules';
import { UNIT_KINDS, type UnitKind } from '../unit.entity';

export class ListUnitsQuery {
  @SearchQuery()
  q?: string;

  @LimitQuery(50)
  limit?: number;

  @CursorQuery()
  cursor?: string;
}

export class CreateUnitDto {
  @NameField(120)
  maker!: string;

  @NameField(120)
  model!: string;

  @ClearableNameField(120)
  serialNumber?: string | null;

  @ApiPropertyOptional({ enum: UNIT_KINDS, enumName: 'UnitKind' })
  @IsOptional()
  @IsIn(UNIT_KINDS)
  kind?: UnitKind;

  @NotesField()
  notes?: string;
}

export class UpdateUnitDto {
  @NameField(120, { isOptional: true })
  maker?: string;

  @NameField(120, { isOptional: true })
  model?: string;

  @ClearableNameField(120)
  serialNumber?: string | null;

  @ApiPropertyOptional({ enum: UNIT_KINDS, enumName: 'UnitKind' })
  @IsOptional()
  @IsIn(UNIT_KINDS)
  kind?: UnitKind;

  @NotesField()
  notes?: string;
}

export class CreateConditionDto {
  @NameField(120)
  name!: string;

  @NotesField()
  notes?: string;

  @ClearableDateField()
  startedOn?: string | null;
}

export class UpdateConditionDto {
  @NameField(120, { isOptional: true })
  name?: string;

  @NotesField()
  notes?: string;

  @ClearableDateField()
  startedOn?: string | null;
}
