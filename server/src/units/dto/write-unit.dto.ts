import { ApiPropertyOptional } from '@nestjs/swagger';
import { IsIn, IsISO8601, IsOptional, Matches, ValidateIf } from 'class-validator';
import {
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

const CalendarDate = () => [
  ApiPropertyOptional({ type: String, format: 'date', nullable: true }),
  ValidateIf((_: unknown, value: unknown) => value !== undefined && value !== null),
  Matches(/^\d{4}-\d{2}-\d{2}$/, { message: 'must be a date such as 2026-03-01' }),
  IsISO8601({ strict: true }, { message: 'must be a day of the calendar' }),
];

function StartedOnField(): PropertyDecorator {
  return (target, key) => CalendarDate().forEach((decorate) => decorate(target, key));
}

export class CreateConditionDto {
  @NameField(120)
  name!: string;

  @NotesField()
  notes?: string;

  @StartedOnField()
  startedOn?: string | null;
}

export class UpdateConditionDto {
  @NameField(120, { isOptional: true })
  name?: string;

  @NotesField()
  notes?: string;

  @StartedOnField()
  startedOn?: string | null;
}
