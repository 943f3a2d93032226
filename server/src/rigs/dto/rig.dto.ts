import { ApiProperty } from '@nestjs/swagger';
import { NameField, NotesField } from '../../common/dto-rules';

export class RigDto {
  @ApiProperty({ format: 'uuid' })
  id!: string;

  @ApiProperty()
  name!: string;

  @ApiProperty()
  notes!: string;

  @ApiProperty({ format: 'date-time' })
  createdAt!: string;
}

export class RigListDto {
  @ApiProperty({ type: [RigDto] })
  items!: RigDto[];
}

export class CreateRigDto {
  @NameField(120)
  name!: string;

  @NotesField()
  notes?: string;
}
