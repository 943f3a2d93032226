import { ApiProperty } from '@nestjs/swagger';

export class NamedPersonDto {
  @ApiProperty({ format: 'uuid' })
  id!: string;

  @ApiProperty()
  displayName!: string;
}
