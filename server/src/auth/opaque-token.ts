import { createHash, randomBytes } from 'node:crypto';

const TOKEN_BYTES = 32;

/** 256 random bits as 43 characters that fit a link. */
export function createOpaqueToken(): string {
  return randomBytes(TOKEN_BYTES).toString('base64url');
}

/** What is stored in a token's place. A plain hash is enough: nobody can try out 2^256 tokens. */
export function hashToken(token: string): string {
  return createHash('sha256').update(token).digest('hex');
}
