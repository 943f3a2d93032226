import { ApiProperty, ApiPropertyOptional } from '@nestjs/swagger';
import { ArrayMaxSize, ArrayUnique, IsArray, IsBoolean, IsIn, IsOptional } from 'class-validator';
import { SearchQuery } from '../../common/dto-rules';
import { ROLES, type Role } from '../../common/roles';

export class PersonDto {
  @ApiProperty({ format: 'uuid' })
  id!: string;

  @ApiProperty()
  displayName!: string;

  @ApiProperty({ format: 'email' })
  email!: string;

  @ApiProperty({ enum: ROLES, enumName: 'Role', isArray: true })
  roles!: Role[];

  @ApiProperty()
  isDisabled!: boolean;

  @ApiProperty({ format: 'date-time' })
  createdAt!: string;

  @ApiProperty({ type: String, format: 'date-time', nullable: true })
  lastSeenAt!: string | null;
}

export class PeopleListDto {
  @ApiProperty({ type: [PersonDto] })
  items!: PersonDto[];
}

export class ListPeopleQuery {
  @SearchQuery()
  q?: string;
}

export class UpdatePersonDto {
  @ApiPropertyOptional({ enum: ROLES, enumName: 'Role', isArray: true })
  @IsOptional()
  @IsArray()
  @ArrayUnique()
  @ArrayMaxSize(ROLES.length)
  @IsIn(ROLES, { each: true })
  roles?: Role[];

  @ApiPropertyOptional()
  @IsOptional()
  @IsBoolean()
  isDisabled?: boolean;
}
