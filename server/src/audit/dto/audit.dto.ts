import { ApiProperty } from '@nestjs/swagger';
import { CursorQuery, LimitQuery, SearchQuery } from '../../common/dto-rules';
import type { AuditEntry } from '../audit-entry.entity';

export class AuditQueryDto {
  @SearchQuery()
  q?: string;

  @LimitQuery(50)
  limit = 50;

  @CursorQuery()
  cursor?: string;
}

export class AuditEntryDto {
  @ApiProperty()
  id!: string;

  @ApiProperty({ format: 'date-time' })
  at!: string;

  @ApiProperty({
    type: String,
    nullable: true,
    description: 'As the name was then; null for the server itself',
  })
  actorName!: string | null;

  @ApiProperty({ example: 'person.roles-changed' })
  action!: string;

  @ApiProperty({ type: String, nullable: true, description: 'kind:id' })
  subject!: string | null;

  @ApiProperty({ type: String, nullable: true })
  detail!: string | null;

  @ApiProperty({ type: String, nullable: true })
  ip!: string | null;
}

export class AuditPageDto {
  @ApiProperty({ type: [AuditEntryDto] })
  items!: AuditEntryDto[];

  @ApiProperty({ type: String, nullable: true })
  nextCursor!: string | null;
}

export function toAuditEntryDto(entry: AuditEntry): AuditEntryDto {
  const { id, at, actorName, action, subject, detail, ip } = entry;
  return { id, at: at.toISOString(), actorName, action, subject, detail, ip };
}
