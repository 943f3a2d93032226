import { applyDecorators } from '@nestjs/common';
import { ApiProperty, ApiPropertyOptional } from '@nestjs/swagger';
import { Transform } from 'class-transformer';
import { IsEmail, IsOptional, IsString, Length, MaxLength } from 'class-validator';
import { PASSWORD_LENGTH_MAX, PASSWORD_LENGTH_MIN } from '../passwords/password-rules';

const EMAIL_LENGTH_MAX = 254;
/** Long enough for any password, short enough that nobody makes us hash a megabyte. */
const TYPED_PASSWORD_LENGTH_MAX = PASSWORD_LENGTH_MAX * 2;

/** One plain e-mail address, in lower case from here on. */
export const EmailField = ({ isOptional = false } = {}) =>
  applyDecorators(
    (isOptional ? ApiPropertyOptional : ApiProperty)({
      type: String,
      format: 'email',
      maxLength: EMAIL_LENGTH_MAX,
    }),
    ...(isOptional ? [IsOptional()] : []),
    Transform(({ value }: { value: unknown }) =>
      typeof value === 'string' ? value.trim().toLowerCase() : value,
    ),
    IsString(),
    MaxLength(EMAIL_LENGTH_MAX),
    IsEmail({}, { message: 'email must be one plain e-mail address' }),
  );

/** A password as it is typed to get in: taken as it is. */
export const PasswordField = () =>
  applyDecorators(
    ApiProperty({ type: String, maxLength: TYPED_PASSWORD_LENGTH_MAX }),
    IsString(),
    Length(1, TYPED_PASSWORD_LENGTH_MAX),
  );

/** A password to be; its rules are checked where the person is known. */
export const NewPasswordField = () =>
  applyDecorators(
    ApiProperty({ type: String, minLength: PASSWORD_LENGTH_MIN, maxLength: PASSWORD_LENGTH_MAX }),
    IsString(),
    Length(1, TYPED_PASSWORD_LENGTH_MAX),
  );

/** The part of a link behind the #. */
export const TokenField = () =>
  applyDecorators(ApiProperty({ type: String, maxLength: 200 }), IsString(), Length(1, 200));
