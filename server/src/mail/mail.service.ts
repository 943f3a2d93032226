import { Inject, Injectable } from '@nestjs/common';
import { DataSource, type EntityManager } from 'typeorm';
import { deriveKey } from '../auth/derive-key';
import { AppError } from '../common/app-error';
import { ENV } from '../config/env.module';
import type { Env } from '../config/env.schema';
import { keepsMailLocally } from './keeps-mail-locally';
import { MailMessage } from './mail-message.entity';
import { sealText } from './sealed-text';

export interface OutgoingMail {
  readonly to: string;
  readonly subject: string;
  readonly text: string;
}

/** A line break or other control character in a header would let a sender add headers of their own. */
const CONTROL = /\p{Cc}/u;

/** Puts mails into the outbox; the dispatcher sends them, however long that takes. */
@Injectable()
export class MailService {
  readonly #key: Buffer;

  constructor(
    private readonly dataSource: DataSource,
    @Inject(ENV) private readonly env: Pick<Env, 'SESSION_SECRET' | 'SMTP_URL' | 'NODE_ENV' | 'DEMO'>,
  ) {
    this.#key = deriveKey(env.SESSION_SECRET, 'mail');
  }

  /** False when nothing is configured to send with: links must be handed over by hand then. */
  get canSend(): boolean {
    return this.env.SMTP_URL !== undefined || keepsMailLocally(this.env);
  }

  /**
   * Queues one mail to one address.
   *
   * @param manager - the transaction of what the mail is about, so that neither happens without the other
   * @throws AppError VALIDATION_FAILED for an address or subject that would break out of its header
   */
  async queue(mail: OutgoingMail, manager: EntityManager = this.dataSource.manager): Promise<void> {
    if (CONTROL.test(mail.to) || CONTROL.test(mail.subject) || /[,;<>\s]/.test(mail.to)) {
      throw new AppError('VALIDATION_FAILED', { fields: { email: ['is not one plain e-mail address'] } });
    }
    await manager.insert(MailMessage, {
      recipient: mail.to,
      subject: mail.subject,
      sealedText: sealText(mail.text, this.#key),
    });
  }
}
