import {
  Inject,
  Injectable,
  Logger,
  type OnApplicationBootstrap,
  type OnModuleDestroy,
} from '@nestjs/common';
import { DataSource } from 'typeorm';
import { AuditService } from '../audit/audit.service';
import { deriveKey } from '../auth/derive-key';
import { ENV } from '../config/env.module';
import type { Env } from '../config/env.schema';
import { MailMessage } from './mail-message.entity';
import { MailTransport } from './mail-transport';
import { openText } from './sealed-text';

const POLL_MS = 2_000;
/** Longer than a transport takes at most, so that nobody else takes over a mail that is still being sent. */
const SENDING_MAX_S = 120;
/** Waits after each failure; after the last the mail counts as failed. */
const RETRY_AFTER_S = [30, 120, 600, 1_800, 7_200, 21_600, 43_200];

interface ClaimedMail {
  id: string;
  recipient: string;
  subject: string;
  sealed_text: Buffer;
  attempts: number;
}

/** Sends what stands in the outbox. Any number of servers may run it at once; each mail is claimed by one. */
@Injectable()
export class MailDispatcher implements OnApplicationBootstrap, OnModuleDestroy {
  readonly #logger = new Logger('MailDispatcher');
  readonly #key: Buffer;
  #timer: NodeJS.Timeout | undefined;
  #running: Promise<void> | undefined;

  constructor(
    private readonly dataSource: DataSource,
    private readonly transport: MailTransport,
    private readonly audit: AuditService,
    @Inject(ENV) private readonly env: Pick<Env, 'SESSION_SECRET' | 'NODE_ENV'>,
  ) {
    this.#key = deriveKey(env.SESSION_SECRET, 'mail');
  }

  onApplicationBootstrap(): void {
    // Tests call `dispatch` themselves, at the moment they choose.
    if (this.env.NODE_ENV === 'test') return;
    this.#timer = setInterval(() => {
      this.dispatch().catch((error: unknown) => this.#logger.error({ err: error }));
    }, POLL_MS);
    this.#timer.unref();
  }

  async onModuleDestroy(): Promise<void> {
    clearInterval(this.#timer);
    await this.#running?.catch((error: unknown) => this.#logger.error({ err: error }));
  }

  /** Sends everything that is due. */
  async dispatch(): Promise<void> {
    this.#running ??= this.#sendAllDue().finally(() => {
      this.#running = undefined;
    });
    await this.#running;
  }

  async #sendAllDue(): Promise<void> {
    for (let mail = await this.#claim(); mail; mail = await this.#claim()) await this.#send(mail);
  }

  async #claim(): Promise<ClaimedMail | undefined> {
    const [rows] = await this.dataSource.query<[ClaimedMail[], number]>(
      `UPDATE mail_message SET state = 'sending', attempts = attempts + 1, due_at = now() + make_interval(secs => $1)
        WHERE id = (SELECT id FROM mail_message WHERE state IN ('queued', 'sending') AND due_at <= now()
                     ORDER BY due_at LIMIT 1 FOR UPDATE SKIP LOCKED)
        RETURNING id, recipient, subject, sealed_text, attempts`,
      [SENDING_MAX_S],
    );
    return rows[0];
  }

  async #send(mail: ClaimedMail): Promise<void> {
    const mails = this.dataSource.getRepository(MailMessage);
    try {
      await this.transport.send({ ...mail, text: openText(mail.sealed_text, this.#key) });
    } catch (error) {
      await this.#postpone(mail, error);
      return;
    }
    await mails.update({ id: mail.id }, { state: 'sent', sealedText: null, lastError: null });
  }

  async #postpone(mail: ClaimedMail, error: unknown): Promise<void> {
    const lastError = (error instanceof Error ? error.message : String(error)).slice(0, 500);
    const waitS = RETRY_AFTER_S[mail.attempts - 1];
    this.#logger.warn({ mailId: mail.id, attempts: mail.attempts, err: error });
    await this.dataSource.query(
      `UPDATE mail_message SET state = $2, last_error = $3, due_at = now() + make_interval(secs => $4),
              sealed_text = CASE WHEN $2 = 'failed' THEN NULL ELSE sealed_text END
        WHERE id = $1`,
      [mail.id, waitS === undefined ? 'failed' : 'queued', lastError, waitS ?? 0],
    );
    if (waitS === undefined) {
      await this.audit.record(null, {
        action: 'mail.failed',
        subject: `mail:${mail.id}`,
        detail: `to ${mail.recipient}`,
      });
    }
  }
}
