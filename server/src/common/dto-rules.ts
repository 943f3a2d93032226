import { applyDecorators } from '@nestjs/common';
import { ApiProperty, ApiPropertyOptional } from '@nestjs/swagger';
import { Transform, Type } from 'class-transformer';
import {
  IsBoolean,
  IsInt,
  IsISO8601,
  IsNumber,
  IsOptional,
  IsString,
  IsUUID,
  Length,
  Matches,
  Max,
  MaxLength,
  Min,
  ValidateIf,
} from 'class-validator';

/** Text of a form: outer spaces are dropped, an empty text counts as one. */
const trimmed = () =>
  Transform(({ value }: { value: unknown }) => (typeof value === 'string' ? value.trim() : value));

/** A line break in a name could begin a new header in a mail, or a new line in a log. */
const oneLine = () =>
  Matches(/^\P{Cc}*$/u, { message: '$property must be one line without control characters' });

/** A text of one line that must be there. */
export const NameField = (maxLength: number, options: { isOptional?: boolean } = {}) =>
  applyDecorators(
    (options.isOptional ? ApiPropertyOptional : ApiProperty)({ type: String, minLength: 1, maxLength }),
    ...(options.isOptional ? [IsOptional()] : []),
    trimmed(),
    IsString(),
    oneLine(),
    Length(1, maxLength),
  );

/** A text that may be left out or be empty. */
export const NotesField = (maxLength = 10_000) =>
  applyDecorators(
    ApiPropertyOptional({ type: String, maxLength }),
    IsOptional(),
    trimmed(),
    IsString(),
    MaxLength(maxLength),
  );

/** A text of one line that may be left out or be empty. */
export const ShortTextField = (maxLength = 200) => applyDecorators(NotesField(maxLength), oneLine());

const calendarDay = () =>
  applyDecorators(
    Matches(/^\d{4}-\d{2}-\d{2}$/, { message: 'must be a date such as 2026-03-01' }),
    IsISO8601({ strict: true }, { message: 'must be a day of the calendar' }),
  );

/** A day that must be there, YYYY-MM-DD. */
export const DateField = (description?: string) =>
  applyDecorators(ApiProperty({ type: String, format: 'date', description }), calendarDay());

/** A day, or null to clear it. */
export const ClearableDateField = () =>
  applyDecorators(
    ApiPropertyOptional({ type: String, format: 'date', nullable: true }),
    ValidateIf((_, value) => value !== undefined && value !== null),
    calendarDay(),
  );

export interface NumberFieldOptions {
  readonly minimum: number;
  readonly maximum: number;
  readonly description?: string;
}

const finiteBetween = ({ minimum, maximum }: NumberFieldOptions) =>
  applyDecorators(IsNumber({ allowNaN: false, allowInfinity: false }), Min(minimum), Max(maximum));

/** A finite number that must be there. */
export const NumberField = (options: NumberFieldOptions) =>
  applyDecorators(ApiProperty({ type: Number, ...options }), finiteBetween(options));

/** A finite number that may be left out, or null for none. */
export const ClearableNumberField = (options: NumberFieldOptions) =>
  applyDecorators(
    ApiPropertyOptional({ type: Number, nullable: true, ...options }),
    ValidateIf((_, value) => value !== undefined && value !== null),
    finiteBetween(options),
  );

/** A text that may be left out, or null to clear it. */
export const ClearableNameField = (maxLength: number) =>
  applyDecorators(
    ApiPropertyOptional({ type: String, nullable: true, minLength: 1, maxLength }),
    trimmed(),
    ValidateIf((_, value) => value !== undefined && value !== null),
    IsString(),
    Length(1, maxLength),
  );

/** The id of another thing, which may be left out, or null to clear it. */
export const ClearableIdField = () =>
  applyDecorators(
    ApiPropertyOptional({ type: String, format: 'uuid', nullable: true }),
    ValidateIf((_, value) => value !== undefined && value !== null),
    IsUUID(),
  );

/** An id in a query or in a multipart form, where an empty field means none. */
export const FormIdField = () =>
  applyDecorators(
    ApiPropertyOptional({ type: String, format: 'uuid' }),
    Transform(({ value }: { value: unknown }) => (value === '' ? undefined : value)),
    IsOptional(),
    IsUUID(),
  );

/** `true` or `false` in a query. */
export const FlagQuery = (description: string) =>
  applyDecorators(
    ApiPropertyOptional({ type: Boolean, description }),
    IsOptional(),
    Transform(({ value }: { value: unknown }) =>
      value === 'true' ? true : value === 'false' ? false : value,
    ),
    IsBoolean(),
  );

export const PAGE_LENGTH_MAX = 200;

/** How many items a page of a list holds. */
export const LimitQuery = (fallback: number) =>
  applyDecorators(
    ApiPropertyOptional({ type: Number, minimum: 1, maximum: PAGE_LENGTH_MAX, default: fallback }),
    IsOptional(),
    Type(() => Number),
    IsInt(),
    Min(1),
    Max(PAGE_LENGTH_MAX),
  );

/** What the page before gave as `nextCursor`. */
export const CursorQuery = () =>
  applyDecorators(ApiPropertyOptional({ type: String }), IsOptional(), IsString(), MaxLength(2_000));

/** Words to look for. */
export const SearchQuery = () =>
  applyDecorators(
    ApiPropertyOptional({ type: String, maxLength: 200 }),
    IsOptional(),
    IsString(),
    MaxLength(200),
  );
