import { Controller, Get, Query } from '@nestjs/common';
import { ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { Roles } from '../common/roles';
import { AuditPageDto, AuditQueryDto, toAuditEntryDto } from './dto/audit.dto';
import { AuditService } from './audit.service';

@ApiTags('audit')
@Controller('audit')
export class AuditController {
  constructor(private readonly audit: AuditService) {}

  /** The audit trail, newest first. */
  @Get()
  @Roles('administrator')
  @ApiOkResponse({ type: AuditPageDto })
  async listAuditEntries(@Query() query: AuditQueryDto): Promise<AuditPageDto> {
    const { entries, nextCursor } = await this.audit.list(query);
    return { items: entries.map(toAuditEntryDto), nextCursor };
  }
}
