import { createHash } from 'node:crypto';
import { isIPv6 } from 'node:net';
import { Injectable } from '@nestjs/common';
import { DataSource } from 'typeorm';
import { AppError } from '../../common/app-error';

/** How many attempts in vain are free, and how the wait grows from then on: doubled each time, up to the longest. */
export interface AttemptRule {
  readonly freeCount: number;
  readonly firstWaitS: number;
  readonly longestWaitS: number;
}

/** NIST SP 800-63B, 5.2.2: far fewer than 100 failures, with a wait that grows from 30 s to an hour. */
export const ACCOUNT_RULE: AttemptRule = { freeCount: 5, firstWaitS: 30, longestWaitS: 3600 };
/** Wider, since a whole house can share one address. */
export const ADDRESS_RULE: AttemptRule = { freeCount: 30, firstWaitS: 30, longestWaitS: 3600 };

/** After this long without an attempt the count begins anew. */
const FORGET_AFTER = '24 hours';
const DOUBLINGS_MAX = 16;

export interface AttemptKey {
  readonly key: string;
  readonly rule: AttemptRule;
}

/** Names an account in the table without storing the address that was typed. */
export function accountKey(what: string, email: string): AttemptKey {
  const hash = createHash('sha256').update(email.toLowerCase()).digest('hex');
  return { key: `${what}:account:${hash}`, rule: ACCOUNT_RULE };
}

/** Names where a request comes from; of IPv6 the network, since one customer owns 2^64 addresses. */
export function addressKey(what: string, ip: string): AttemptKey {
  const network = isIPv6(ip) && !ip.startsWith('::') ? ip.split(':').slice(0, 4).join(':') : ip;
  return { key: `${what}:address:${network}`, rule: ADDRESS_RULE };
}

/** Counts attempts in the database, so that the limits hold for all servers together and survive a restart. */
@Injectable()
export class AttemptsService {
  constructor(private readonly dataSource: DataSource) {}

  /** @throws AppError TOO_MANY_REQUESTS while the key is blocked; counts nothing */
  async assertFree({ key }: AttemptKey): Promise<void> {
    const [row] = await this.dataSource.query<{ wait_s: number }[]>(
      `SELECT extract(epoch FROM blocked_until - clock_timestamp())::float8 AS wait_s
         FROM attempt WHERE key = $1 AND blocked_until > clock_timestamp()`,
      [key],
    );
    if (row) throw new AppError('TOO_MANY_REQUESTS', { retryAfterS: row.wait_s });
  }

  /**
   * Counts one attempt before it is made, so that many at once can't slip under the limit together.
   * @throws AppError TOO_MANY_REQUESTS while the key is blocked
   */
  async begin(attempt: AttemptKey): Promise<void> {
    const { freeCount, firstWaitS, longestWaitS } = attempt.rule;
    const rows = await this.dataSource.query<unknown[]>(
      `INSERT INTO attempt AS a (key, count, updated_at) VALUES ($1, 1, clock_timestamp())
       ON CONFLICT (key) DO UPDATE SET
         count = CASE WHEN a.updated_at < clock_timestamp() - $5::interval THEN 1 ELSE a.count + 1 END,
         updated_at = clock_timestamp(),
         blocked_until = CASE
           WHEN a.updated_at < clock_timestamp() - $5::interval OR a.count + 1 < $2::int THEN NULL
           ELSE clock_timestamp()
             + make_interval(secs => least($4::float8, $3::float8 * 2 ^ least(a.count + 1 - $2::int, $6::int)))
         END
       WHERE a.blocked_until IS NULL OR a.blocked_until <= clock_timestamp()
       RETURNING 1`,
      [attempt.key, freeCount, firstWaitS, longestWaitS, FORGET_AFTER, DOUBLINGS_MAX],
    );
    if (rows.length === 0) await this.assertFree(attempt);
  }

  /** The account's owner got in: its count begins anew. */
  async forget({ key }: AttemptKey): Promise<void> {
    await this.dataSource.query('DELETE FROM attempt WHERE key = $1', [key]);
  }

  /** An attempt turned out well: it is not held against the address, but the earlier failures are. */
  async takeBack({ key }: AttemptKey): Promise<void> {
    await this.dataSource.query(
      'UPDATE attempt SET count = greatest(count - 1, 0), blocked_until = NULL WHERE key = $1',
      [key],
    );
  }
}
