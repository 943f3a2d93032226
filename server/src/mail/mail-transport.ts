import { Inject, Injectable } from '@nestjs/common';
import { createTransport, type Transporter } from 'nodemailer';
import { ENV } from '../config/env.module';
import { isLoopbackHost, type Env } from '../config/env.schema';
import { LocalMailServer } from './local-mail-server';

const TIME_MAX_MS = 20_000;

export interface MailToSend {
  readonly id: string;
  readonly recipient: string;
  readonly subject: string;
  readonly text: string;
}

/** Hands one mail to the configured server, or to the local one. */
@Injectable()
export class MailTransport {
  #transporter: Promise<Transporter> | undefined;

  constructor(
    @Inject(ENV) private readonly env: Pick<Env, 'SMTP_URL' | 'MAIL_FROM' | 'PUBLIC_URL'>,
    private readonly localServer: LocalMailServer,
  ) {}

  /** @throws when the server did not take the mail */
  async send(mail: MailToSend): Promise<void> {
    this.#transporter ??= this.#connect();
    const transporter = await this.#transporter;
    await transporter.sendMail({
      from: { name: 'Benchlark', address: this.env.MAIL_FROM },
      to: { name: '', address: mail.recipient },
      subject: mail.subject,
      text: mail.text,
      // The same at every try, so that a receiver can tell a mail that was sent twice.
      messageId: `<${mail.id}@${new URL(this.env.PUBLIC_URL).hostname}>`,
      disableFileAccess: true,
      disableUrlAccess: true,
    });
  }

  async #connect(): Promise<Transporter> {
    const url = new URL(this.env.SMTP_URL ?? (await this.localServer.url()));
    const isSecure = url.protocol === 'smtps:';
    return createTransport({
      host: url.hostname.replace(/^\[|\]$/g, ''),
      port: url.port === '' ? (isSecure ? 465 : 587) : Number(url.port),
      secure: isSecure,
      // Mails hold links that let somebody in: beyond this machine only over TLS with a certificate that holds.
      requireTLS: !isSecure && !isLoopbackHost(url.hostname),
      auth: url.username
        ? { user: decodeURIComponent(url.username), pass: decodeURIComponent(url.password) }
        : undefined,
      connectionTimeout: TIME_MAX_MS,
      greetingTimeout: TIME_MAX_MS,
      socketTimeout: TIME_MAX_MS,
    });
  }
}
