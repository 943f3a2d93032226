import { ApiProperty } from '@nestjs/swagger';
import type { ReceivedMail } from '../local-mail-server';

export class MailDto {
  @ApiProperty()
  id!: string;

  @ApiProperty({ format: 'date-time' })
  at!: string;

  @ApiProperty()
  to!: string;

  @ApiProperty()
  subject!: string;

  @ApiProperty()
  text!: string;
}

export class MailListDto {
  @ApiProperty({ type: [MailDto] })
  items!: MailDto[];
}

export function toMailDto({ id, at, to, subject, text }: ReceivedMail): MailDto {
  return { id, at: at.toISOString(), to, subject, text };
}
