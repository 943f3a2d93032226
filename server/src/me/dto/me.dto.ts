import { ApiProperty } from '@nestjs/swagger';
import { NewPasswordField, PasswordField } from '../../auth/dto/credentials.fields';
import { NameField } from '../../common/dto-rules';

export class UpdateMeDto {
  @NameField(80, { isOptional: true })
  displayName?: string;
}

export class ChangePasswordDto {
  @PasswordField()
  currentPassword!: string;

  @NewPasswordField()
  newPassword!: string;
}

export class OwnSessionDto {
  @ApiProperty({ format: 'uuid' })
  id!: string;

  @ApiProperty({ format: 'date-time' })
  createdAt!: string;

  @ApiProperty({ format: 'date-time' })
  lastSeenAt!: string;

  @ApiProperty()
  userAgent!: string;

  @ApiProperty()
  isCurrent!: boolean;
}

export class ApiTokenDto {
  @ApiProperty({ format: 'uuid' })
  id!: string;

  @ApiProperty()
  name!: string;

  @ApiProperty({ format: 'date-time' })
  createdAt!: string;

  @ApiProperty({ type: String, format: 'date-time', nullable: true })
  lastUsedAt!: string | null;
}

export class MadeApiTokenDto extends ApiTokenDto {
  @ApiProperty({ description: 'The token itself; it is shown this once' })
  token!: string;
}

export class CreateApiTokenDto {
  @NameField(80)
  name!: string;
}
