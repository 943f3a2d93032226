import { Controller, Get, Param, Req, Res } from '@nestjs/common';
import { ApiOkResponse, ApiProduces, ApiTags } from '@nestjs/swagger';
import type { Request, Response } from 'express';
import { DataSource } from 'typeorm';
import { AppError } from '../common/app-error';
import { IdPipe } from '../common/id.pipe';
import { Roles } from '../common/roles';
import { sendObject, setDownloadHeaders } from '../files/send-file';
import { EvidenceService } from '../storage/evidence.service';
import { ObjectStore } from '../storage/object-store';
import { CaptureListService } from './capture-list.service';
import { CaptureOverview } from './capture-overview.entity';
import { OverviewDto } from './dto/capture.dto';

@ApiTags('captures')
@Controller('captures')
export class CaptureFilesController {
  constructor(
    private readonly captures: CaptureListService,
    private readonly evidence: EvidenceService,
    private readonly store: ObjectStore,
    private readonly dataSource: DataSource,
  ) {}

  @Get(':id/file')
  @Roles('technician', 'reviewer', 'administrator')
  @ApiProduces('audio/wav')
  @ApiOkResponse({ schema: { type: 'string', format: 'binary' } })
  async downloadCapture(
    @Param('id', IdPipe) id: string,
    @Req() request: Request,
    @Res() response: Response,
  ): Promise<void> {
    const { sha256, sizeBytes, fileName } = await this.captures.get(id);
    await this.evidence.ensureSound(sha256);
    setDownloadHeaders(response, 'audio/wav', fileName);
    await sendObject(request, response, { store: this.store, sha256, sizeBytes });
  }

  @Get(':id/overview')
  @Roles('technician', 'reviewer', 'administrator')
  @ApiOkResponse({ type: OverviewDto })
  async getOverview(@Param('id', IdPipe) id: string): Promise<OverviewDto> {
    const { sha256 } = await this.captures.get(id);
    const overview = await this.dataSource.getRepository(CaptureOverview).findOneBy({ sha256 });
    if (!overview) throw new AppError('NOT_FOUND', { detail: 'The capture has not been read yet.' });
    return overview.content as OverviewDto;
  }
}
