import { Controller, Get } from '@nestjs/common';
import { ApiNotFoundResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { AppError } from '../common/app-error';
import { Roles } from '../common/roles';
import { MailListDto, toMailDto } from './dto/mail.dto';
import { LocalMailServer } from './local-mail-server';

@ApiTags('mail')
@Controller('mail')
export class MailController {
  constructor(private readonly localServer: LocalMailServer) {}

  /** What a development or demo bench would have sent. */
  @Get()
  @Roles('administrator')
  @ApiOkResponse({ type: MailListDto })
  @ApiNotFoundResponse({ description: 'Mails are really sent here, none are kept' })
  listMail(): MailListDto {
    if (!this.localServer.isUsed) throw new AppError('NOT_FOUND');
    return { items: this.localServer.mails.map(toMailDto) };
  }
}
