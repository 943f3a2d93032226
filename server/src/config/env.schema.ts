import { existsSync } from 'node:fs';
import { isIP } from 'node:net';
import { resolve } from 'node:path';
import { z } from 'zod';
import { jobsEnvShape, storageEnvShape } from './storage-env';

/** Stands in `.env.example`; a production server refuses to start with it. */
export const EXAMPLE_SECRET = 'replace-this-with-the-output-of-openssl-rand-hex-32';
const DEVELOPMENT_SECRET = 'only-for-development-never-in-production';

/** Values used when a variable is unset and NODE_ENV is not `production`. */
const DEVELOPMENT_DEFAULTS: Readonly<Record<string, string>> = {
  PUBLIC_URL: 'http://127.0.0.1:4870',
  DATABASE_URL: 'postgres://benchlark@127.0.0.1:5432/benchlark',
  SESSION_SECRET: DEVELOPMENT_SECRET,
};

/** True for the names and addresses that never leave this machine. */
export function isLoopbackHost(host: string): boolean {
  const bare = host.replace(/^\[|\]$/g, '');
  return bare === 'localhost' || bare === '::1' || (isIP(bare) === 4 && bare.startsWith('127.'));
}

const positiveInteger = (fallback: number) => z.coerce.number().int().positive().default(fallback);

/** `false`, a number of proxies, or a comma-separated list of their addresses; never "any". */
const trustProxy = z
  .string()
  .default('')
  .transform((text, context): false | number | string[] => {
    if (text === '' || text === 'false') return false;
    if (/^[1-9]$/.test(text)) return Number(text);
    const addresses = text.split(',').map((part) => part.trim());
    const isListed = addresses.every((part) => isIP(part.split('/')[0] ?? '') !== 0 || part === 'loopback');
    if (isListed) return addresses;
    context.addIssue({
      code: 'custom',
      message: 'is a number of proxies (1 to 9) or a list of their addresses',
    });
    return z.NEVER;
  });

export const envSchema = z
  .object({
    NODE_ENV: z.enum(['development', 'test', 'production']).default('development'),
    HOST: z.string().default('127.0.0.1'),
    PORT: z.coerce.number().int().min(0).max(65_535).default(4870),
    PUBLIC_URL: z.url({ protocol: /^https?$/ }).transform((url) => url.replace(/\/+$/, '')),
    TRUST_PROXY: trustProxy,
    LOG_LEVEL: z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'silent']).default('info'),
    APP_DIST_DIR: z
      .string()
      .default(resolve(__dirname, '../../../app/dist'))
      .transform((path) => resolve(path)),
    SHUTDOWN_DEADLINE_MS: positiveInteger(20_000),
    REQUESTS_PER_MINUTE: positiveInteger(3_000),
    DEMO: z.stringbool().default(false),

    DATABASE_URL: z.url({ protocol: /^postgres(ql)?$/ }),
    DATABASE_POOL_SIZE: positiveInteger(12),
    DATABASE_QUERY_TIMEOUT_MS: positiveInteger(8_000),

    SESSION_SECRET: z.string().min(32, 'needs at least 32 characters'),
    SESSION_IDLE_HOURS: positiveInteger(24),
    SESSION_ABSOLUTE_HOURS: positiveInteger(24 * 14),
    INVITATION_HOURS: positiveInteger(24 * 7),
    PASSWORD_RESET_MINUTES: positiveInteger(60),
    ARGON2_MEMORY_KIB: z.coerce.number().int().min(64).default(65_536),
    ARGON2_TIME_COST: positiveInteger(3),
    ARGON2_PARALLELISM: z.coerce.number().int().min(1).max(4).default(2),

    SMTP_URL: z.url({ protocol: /^smtps?$/ }).optional(),
    MAIL_FROM: z.email().default('bench@localhost.localdomain'),

    MAX_UPLOAD_BYTES: positiveInteger(1_073_741_824),
    ...storageEnvShape,
    ...jobsEnvShape,
  })
  .superRefine((env, context) => {
    const refuse = (path: string, message: string) =>
      context.addIssue({ code: 'custom', path: [path], message });
    const url = new URL(env.PUBLIC_URL);
    if (url.protocol === 'http:' && !isLoopbackHost(url.hostname)) {
      refuse('PUBLIC_URL', 'must begin with https:// unless it names this machine (127.0.0.1 or localhost)');
    }
    if (
      env.DEMO &&
      !(isLoopbackHost(env.HOST) && isLoopbackHost(url.hostname) && env.TRUST_PROXY === false)
    ) {
      refuse('DEMO', 'works on the loopback address only, without a proxy: its passwords are public');
    }
    if (env.NODE_ENV !== 'production') return;
    if ([EXAMPLE_SECRET, DEVELOPMENT_SECRET].includes(env.SESSION_SECRET)) {
      refuse('SESSION_SECRET', 'still holds an example value; make one with: openssl rand -hex 32');
    }
    if (env.ARGON2_MEMORY_KIB < 47_104 && !(env.ARGON2_MEMORY_KIB >= 19_456 && env.ARGON2_TIME_COST >= 2)) {
      refuse('ARGON2_MEMORY_KIB', 'is below the accepted settings for argon2id (19456 KiB with time cost 2)');
    }
  });

export type Env = z.output<typeof envSchema>;

/** A configuration that can't be used; the message names each variable and never shows its value. */
export class EnvError extends Error {
  override readonly name = 'EnvError';
}

/**
 * Checks a set of environment variables.
 *
 * @param source - variables as strings; an empty string counts as unset
 * @throws EnvError naming every variable that is missing or wrong
 */
export function parseEnv(source: Readonly<Record<string, string | undefined>>): Env {
  const given = Object.fromEntries(
    Object.entries(source).filter(([, value]) => value !== undefined && value !== ''),
  );
  const defaults = given['NODE_ENV'] === 'production' ? {} : DEVELOPMENT_DEFAULTS;
  const result = envSchema.safeParse({ ...defaults, ...given });
  if (result.success) return result.data;
  const lines = result.error.issues.map(({ path, message }) => `${path.join('.')}: ${message}`);
  throw new EnvError(`the configuration can't be used: ${lines.join('; ')}`);
}

/** Reads the process's environment, and `server/.env` beneath it when there is one. */
export function readEnv(): Env {
  const file = resolve(__dirname, '../../.env');
  if (existsSync(file)) process.loadEnvFile(file);
  return parseEnv(process.env);
}
