import { z } from 'zod';
import type { components } from '@/lib/api-types';

type Schemas = components['schemas'];

/** NIST SP 800-63B, 5.1.1.2: length counts, not a mixture of signs. The server has the last word. */
const LEAST_PASSWORD_LENGTH = 8;

export const PASSWORD_HELP = `At least ${LEAST_PASSWORD_LENGTH} characters. A few unrelated words are easy to keep and hard to guess.`;

export const newPassword = z
  .string()
  .min(LEAST_PASSWORD_LENGTH, `At least ${LEAST_PASSWORD_LENGTH} characters`)
  .max(128, 'At most 128 characters');
const email = z.email('This does not read as an e-mail address');
const displayName = z
  .string()
  .trim()
  .min(1, 'Say how the bench shall name you')
  .max(80, 'At most 80 characters');

export const signInSchema = z.object({
  email,
  password: z.string().min(1, 'Type your password'),
}) satisfies z.ZodType<Schemas['SignInDto']>;

export const setupSchema = z.object({
  secret: z.string().trim().min(1, 'It stands in the terminal where the server was started'),
  benchName: z.string().trim().min(1, 'Give the bench a name').max(80, 'At most 80 characters'),
  displayName,
  email,
  password: newPassword,
}) satisfies z.ZodType<Schemas['SetupDto']>;

export const acceptSchema = z.object({
  displayName,
  email,
  password: newPassword,
}) satisfies z.ZodType<Omit<Schemas['AcceptInvitationDto'], 'token'>>;

export const askResetSchema = z.object({ email }) satisfies z.ZodType<Schemas['AskPasswordResetDto']>;

export const resetSchema = z.object({ password: newPassword }) satisfies z.ZodType<
  Omit<Schemas['CompletePasswordResetDto'], 'token'>
>;
