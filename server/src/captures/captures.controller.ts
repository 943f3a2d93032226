import {
  Body,
  Controller,
  Get,
  Headers,
  Param,
  Patch,
  Post,
  Query,
  Req,
  UseGuards,
  UseInterceptors,
} from '@nestjs/common';
import { ApiBody, ApiConsumes, ApiCreatedResponse, ApiHeader, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { CurrentActor, CurrentPerson, type Actor, type SignedInPerson } from '../common/actor';
import { AppError } from '../common/app-error';
import { IdPipe } from '../common/id.pipe';
import { Roles } from '../common/roles';
import { CaptureListService } from './capture-list.service';
import { CapturesService } from './captures.service';
import { CaptureDto, CaptureListDto } from './dto/capture.dto';
import { FileCaptureDto, UploadCaptureDto, UploadFieldsDto } from './dto/file-capture.dto';
import { ListCapturesQuery } from './dto/list-captures.query';
import { FilingService } from './filing.service';
import { CaptureUploadInterceptor, type UploadRequest } from './upload/capture-upload.interceptor';
import { UploadSizeGuard } from './upload/upload-size.guard';

const IDEMPOTENCY_KEY = /^[\x21-\x7e]{1,200}$/;

@ApiTags('captures')
@Controller('captures')
export class CapturesController {
  constructor(
    private readonly captures: CapturesService,
    private readonly lists: CaptureListService,
    private readonly filing: FilingService,
  ) {}

  @Get()
  @Roles('technician', 'reviewer', 'administrator')
  @ApiOkResponse({ type: CaptureListDto })
  listCaptures(@Query() query: ListCapturesQuery): Promise<CaptureListDto> {
    return this.lists.list(query);
  }

  @Post()
  @Roles('technician', 'reviewer')
  @UseGuards(UploadSizeGuard)
  @UseInterceptors(CaptureUploadInterceptor)
  @ApiConsumes('multipart/form-data')
  @ApiBody({ type: UploadCaptureDto })
  @ApiHeader({
    name: 'Idempotency-Key',
    required: false,
    description: 'Sending the same upload again makes no second capture',
  })
  @ApiCreatedResponse({ type: CaptureDto })
  async uploadCapture(
    @Req() request: UploadRequest,
    @Body() fields: UploadFieldsDto,
    @CurrentPerson() person: SignedInPerson,
    @CurrentActor() actor: Actor,
    @Headers('idempotency-key') idempotencyKey?: string,
  ): Promise<CaptureDto> {
    const { upload: file } = request;
    if (!file) throw new AppError('VALIDATION_FAILED', { fields: { file: ['is missing'] } });
    if (idempotencyKey !== undefined && !IDEMPOTENCY_KEY.test(idempotencyKey)) {
      throw new AppError('VALIDATION_FAILED', {
        fields: { 'Idempotency-Key': ['is 1 to 200 printable characters'] },
      });
    }
    return this.lists.get(await this.captures.archive({ file, fields, person, actor, idempotencyKey }));
  }

  @Get(':id')
  @Roles('technician', 'reviewer', 'administrator')
  @ApiOkResponse({ type: CaptureDto })
  getCapture(@Param('id', IdPipe) id: string): Promise<CaptureDto> {
    return this.lists.get(id);
  }

  @Patch(':id')
  @Roles('technician', 'reviewer')
  @ApiOkResponse({ type: CaptureDto })
  async updateCapture(
    @Param('id', IdPipe) id: string,
    @Body() body: FileCaptureDto,
    @CurrentActor() actor: Actor,
  ): Promise<CaptureDto> {
    await this.filing.file(id, body, actor);
    return this.lists.get(id);
  }
}
