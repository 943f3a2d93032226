import { ApiProperty } from '@nestjs/swagger';
import { ArrayMaxSize, ArrayNotEmpty, ArrayUnique, IsArray, IsIn } from 'class-validator';
import { EmailField, NewPasswordField, TokenField } from '../../auth/dto/credentials.fields';
import { NameField } from '../../common/dto-rules';
import { ROLES, type Role } from '../../common/roles';

export class InvitationDto {
  @ApiProperty({ format: 'uuid' })
  id!: string;

  @ApiProperty({ type: String, format: 'email', nullable: true })
  email!: string | null;

  @ApiProperty({ enum: ROLES, enumName: 'Role', isArray: true })
  roles!: Role[];

  @ApiProperty()
  invitedBy!: string;

  @ApiProperty({ format: 'date-time' })
  createdAt!: string;

  @ApiProperty({ format: 'date-time' })
  expiresAt!: string;
}

export class InvitationListDto {
  @ApiProperty({ type: [InvitationDto] })
  items!: InvitationDto[];
}

export class MadeInvitationDto extends InvitationDto {
  @ApiProperty({ description: 'To be copied; it is shown this once' })
  link!: string;

  @ApiProperty()
  isMailed!: boolean;
}

export class CreateInvitationDto {
  @EmailField({ isOptional: true })
  email?: string;

  @ApiProperty({ enum: ROLES, enumName: 'Role', isArray: true, minItems: 1 })
  @IsArray()
  @ArrayNotEmpty()
  @ArrayUnique()
  @ArrayMaxSize(ROLES.length)
  @IsIn(ROLES, { each: true })
  roles!: Role[];
}

export class LookAtInvitationDto {
  @TokenField()
  token!: string;
}

export class InvitationLookDto {
  @ApiProperty({
    type: String,
    format: 'email',
    nullable: true,
    description: 'Set when only this address may accept',
  })
  email!: string | null;

  @ApiProperty({ enum: ROLES, enumName: 'Role', isArray: true })
  roles!: Role[];

  @ApiProperty()
  invitedBy!: string;

  @ApiProperty()
  benchName!: string;

  @ApiProperty({ format: 'date-time' })
  expiresAt!: string;
}

export class AcceptInvitationDto {
  @TokenField()
  token!: string;

  @NameField(80)
  displayName!: string;

  @EmailField({ isOptional: true })
  email?: string;

  @NewPasswordField()
  password!: string;
}
