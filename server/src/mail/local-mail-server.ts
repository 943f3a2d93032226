import { once } from 'node:events';
import type { AddressInfo } from 'node:net';
import { Inject, Injectable, Logger, type OnApplicationShutdown } from '@nestjs/common';
import { simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';
import { ENV } from '../config/env.module';
import type { Env } from '../config/env.schema';
import { keepsMailLocally } from './keeps-mail-locally';

export interface ReceivedMail {
  readonly id: string;
  readonly at: Date;
  readonly to: string;
  readonly subject: string;
  readonly text: string;
  /** The mail as it came over the wire. */
  readonly raw: string;
}

const KEPT_MAX = 200;
const MAIL_BYTES_MAX = 1_000_000;

/** A real SMTP server on a loopback port that keeps what it gets: mails take the same way as in production. */
@Injectable()
export class LocalMailServer implements OnApplicationShutdown {
  readonly #logger = new Logger('LocalMailServer');
  readonly #mails: ReceivedMail[] = [];
  #server: SMTPServer | undefined;
  #url: Promise<string> | undefined;
  #receivedCount = 0;

  constructor(@Inject(ENV) private readonly env: Pick<Env, 'SMTP_URL' | 'NODE_ENV' | 'DEMO'>) {}

  get isUsed(): boolean {
    return keepsMailLocally(this.env);
  }

  /** Newest first. */
  get mails(): readonly ReceivedMail[] {
    return this.#mails;
  }

  /** Where to send to; the server is started by the first call. */
  url(): Promise<string> {
    this.#url ??= this.#start();
    return this.#url;
  }

  async onApplicationShutdown(): Promise<void> {
    const server = this.#server;
    if (server) await new Promise<void>((resolve) => server.close(resolve));
  }

  async #start(): Promise<string> {
    const server = new SMTPServer({
      authOptional: true,
      disabledCommands: ['AUTH', 'STARTTLS'],
      disableReverseLookup: true,
      size: MAIL_BYTES_MAX,
      onData: (stream, session, callback) => {
        const chunks: Buffer[] = [];
        stream.on('data', (chunk: Buffer) => chunks.push(chunk));
        stream.on('end', () => {
          const recipients = session.envelope.rcptTo.map(({ address }) => address);
          this.#keep(Buffer.concat(chunks), recipients).then(
            () => callback(),
            (error: unknown) => callback(error instanceof Error ? error : new Error(String(error))),
          );
        });
      },
    });
    server.on('error', (error) => this.#logger.warn({ err: error }));
    this.#server = server;
    const listener = server.listen(0, '127.0.0.1');
    await once(listener, 'listening');
    return `smtp://127.0.0.1:${(listener.address() as AddressInfo).port}`;
  }

  async #keep(raw: Buffer, recipients: string[]): Promise<void> {
    const parsed = await simpleParser(raw);
    this.#receivedCount++;
    this.#mails.unshift({
      id: String(this.#receivedCount),
      at: new Date(),
      to: recipients.join(', '),
      subject: parsed.subject ?? '',
      text: (parsed.text ?? '').trimEnd(),
      raw: raw.toString('utf8'),
    });
    this.#mails.length = Math.min(this.#mails.length, KEPT_MAX);
  }
}
