import { Global, Module } from '@nestjs/common';
import { LocalMailServer } from './local-mail-server';
import { MailController } from './mail.controller';
import { MailDispatcher } from './mail-dispatcher';
import { MailService } from './mail.service';
import { MailTransport } from './mail-transport';

@Global()
@Module({
  controllers: [MailController],
  providers: [LocalMailServer, MailDispatcher, MailService, MailTransport],
  exports: [MailService],
})
export class MailModule {}
