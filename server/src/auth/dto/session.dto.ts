import { ApiProperty } from '@nestjs/swagger';
import { ROLES, type Role } from '../../common/roles';
import { PersonDto } from '../../people/dto/person.dto';
import { EmailField, PasswordField } from './credentials.fields';

export class DemoAccountDto {
  @ApiProperty()
  displayName!: string;

  @ApiProperty({ format: 'email' })
  email!: string;

  @ApiProperty()
  password!: string;

  @ApiProperty({ enum: ROLES, enumName: 'Role', isArray: true })
  roles!: Role[];
}

export class DemoDto {
  @ApiProperty({ type: [DemoAccountDto] })
  accounts!: DemoAccountDto[];
}

/** What this bench takes in. */
export class LimitsDto {
  @ApiProperty({ type: 'integer' })
  maxUploadBytes!: number;

  @ApiProperty({ type: [String] })
  acceptedSampleFormats!: string[];

  @ApiProperty({ type: 'integer' })
  minSampleRateHz!: number;

  @ApiProperty({ type: 'integer' })
  maxSampleRateHz!: number;

  @ApiProperty({ type: 'integer' })
  maxChannels!: number;
}

/** What a page must know before anything else. */
export class SessionDto {
  @ApiProperty({ type: PersonDto, nullable: true })
  person!: PersonDto | null;

  @ApiProperty({ description: 'Goes into the header x-csrf-token of every request that changes something' })
  csrfToken!: string;

  @ApiProperty({ description: 'True until the first administrator has been made' })
  firstRun!: boolean;

  @ApiProperty()
  benchName!: string;

  @ApiProperty({ type: DemoDto, nullable: true })
  demo!: DemoDto | null;

  @ApiProperty({ description: 'True when mails are kept on a page instead of being sent' })
  hasMailPage!: boolean;

  @ApiProperty({ type: LimitsDto })
  limits!: LimitsDto;
}

export class SignInDto {
  @EmailField()
  email!: string;

  @PasswordField()
  password!: string;
}
