import { Body, Controller, Get, HttpCode, Param, Post, Query, Req, Res } from '@nestjs/common';
import {
  ApiAcceptedResponse,
  ApiOkResponse,
  ApiProduces,
  ApiPropertyOptional,
  ApiTags,
} from '@nestjs/swagger';
import { toRecordJson } from '@benchlark/dsp';
import { IsIn, IsOptional } from 'class-validator';
import type { Request, Response } from 'express';
import { CurrentActor, CurrentPerson, type Actor, type SignedInPerson } from '../common/actor';
import { AppError } from '../common/app-error';
import { IdPipe } from '../common/id.pipe';
import { Roles } from '../common/roles';
import { sendObject, setDownloadHeaders } from '../files/send-file';
import { isSha256, ObjectStore } from '../storage/object-store';
import { RecordDto, VerificationDto } from './dto/record.dto';
import { RecordListDto } from './dto/record-summary.dto';
import { RequestedRecordDto, RequestRecordDto } from './dto/request-record.dto';
import { figuresCsv } from './figures-csv';
import { RecordsService } from './records.service';
import { VerificationService } from './verification.service';

export class DownloadRecordQuery {
  @ApiPropertyOptional({ enum: ['json', 'csv'], enumName: 'DownloadFormat', default: 'json' })
  @IsOptional()
  @IsIn(['json', 'csv'])
  format?: 'json' | 'csv';
}

@ApiTags('records')
@Controller()
export class RecordsController {
  constructor(
    private readonly records: RecordsService,
    private readonly verification: VerificationService,
    private readonly store: ObjectStore,
  ) {}

  @Get('captures/:id/records')
  @Roles('technician', 'reviewer', 'administrator')
  @ApiOkResponse({ type: RecordListDto })
  async listRecords(@Param('id', IdPipe) id: string): Promise<RecordListDto> {
    return { items: await this.records.listOf(id) };
  }

  @Post('captures/:id/records')
  @HttpCode(202)
  @Roles('technician', 'reviewer')
  @ApiAcceptedResponse({ type: RequestedRecordDto })
  requestRecord(
    @Param('id', IdPipe) id: string,
    @Body() body: RequestRecordDto,
    @CurrentActor() actor: Actor,
    @CurrentPerson() person: SignedInPerson,
  ): Promise<RequestedRecordDto> {
    return this.records.request(id, body, { ...actor, person });
  }

  @Get('records/:id')
  @Roles('technician', 'reviewer', 'administrator')
  @ApiOkResponse({ type: RecordDto })
  getRecord(@Param('id', IdPipe) id: string): Promise<RecordDto> {
    return this.records.get(id);
  }

  @Get('records/:id/traces/:sha256')
  @Roles('technician', 'reviewer', 'administrator')
  @ApiProduces('application/octet-stream')
  @ApiOkResponse({
    schema: { type: 'string', format: 'binary' },
    description: 'Little-endian Float64: all x, then all y',
  })
  async downloadTrace(
    @Param('id', IdPipe) id: string,
    @Param('sha256') sha256: string,
    @Req() request: Request,
    @Res() response: Response,
  ): Promise<void> {
    if (!isSha256(sha256)) throw new AppError('NOT_FOUND');
    const trace = await this.records.trace(id, sha256);
    setDownloadHeaders(response, 'application/octet-stream');
    await sendObject(request, response, { store: this.store, ...trace });
  }

  @Get('records/:id/download')
  @Roles('technician', 'reviewer', 'administrator')
  @ApiProduces('application/json', 'text/csv')
  @ApiOkResponse({ schema: { type: 'string' } })
  async downloadRecord(
    @Param('id', IdPipe) id: string,
    @Query() { format = 'json' }: DownloadRecordQuery,
    @Res() response: Response,
  ): Promise<void> {
    const row = await this.records.row(id);
    const name = `capture-${row.captureNumber}-record-${row.ordinal}.${format}`;
    if (format === 'csv') {
      setDownloadHeaders(response, 'text/csv; charset=utf-8; header=present', name);
      response.end(figuresCsv(row.content));
      return;
    }
    const record = toRecordJson(await this.records.withTraces(row), { traces: 'reduced' });
    setDownloadHeaders(response, 'application/json; charset=utf-8', name);
    response.end(`${JSON.stringify(record, null, 2)}\n`);
  }

  @Post('records/:id/verify')
  @HttpCode(200)
  @Roles('technician', 'reviewer', 'administrator')
  @ApiOkResponse({ type: VerificationDto })
  verifyRecord(@Param('id', IdPipe) id: string): Promise<VerificationDto> {
    return this.verification.verify(id);
  }
}
