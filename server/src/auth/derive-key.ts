import { hkdfSync } from 'node:crypto';

export type KeyPurpose = 'session-cookie' | 'csrf' | 'mail';

/** One key a purpose from the server's one secret, so that none can stand in for another (HKDF, RFC 5869). */
export function deriveKey(secret: string, purpose: KeyPurpose): Buffer {
  return Buffer.from(hkdfSync('sha256', secret, 'benchlark', purpose, 32));
}
