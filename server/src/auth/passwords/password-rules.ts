import { AppError } from '../../common/app-error';
import { COMMON_PASSWORDS } from './common-passwords';

export const PASSWORD_LENGTH_MIN = 8;
export const PASSWORD_LENGTH_MAX = 128;
/** What must remain of a password besides the names that everybody can guess. */
const OWN_CHARACTERS_MIN = 6;
const CONTEXT_WORD_LENGTH_MIN = 3;
const PRODUCT_WORDS = ['benchlark', 'bench', 'lark'];

export interface PasswordContext {
  readonly email?: string;
  readonly displayName?: string;
  readonly benchName?: string;
}

function contextWords({ email = '', displayName = '', benchName = '' }: PasswordContext): string[] {
  const words = [
    email,
    ...email.split(/[^\p{L}\p{N}]+/u),
    ...displayName.split(/\s+/),
    ...benchName.split(/\s+/),
  ];
  return [...words.map((word) => word.toLowerCase()), ...PRODUCT_WORDS]
    .filter((word) => word.length >= CONTEXT_WORD_LENGTH_MIN)
    .sort((a, b) => b.length - a.length);
}

/** True for the same character over and over, and for runs such as 12345678 or hgfedcba. */
function isRun(characters: readonly number[]): boolean {
  const steps = characters.slice(1).map((code, index) => code - (characters[index] ?? 0));
  return [0, 1, -1].some((step) => steps.every((other) => other === step));
}

/**
 * Says what is wrong with a new password, in words for the person.
 *
 * There are no rules about kinds of characters; length, and not being guessable, are all that counts.
 * @returns undefined when the password is acceptable
 */
export function findPasswordFault(password: string, context: PasswordContext): string | undefined {
  // Code points, so that one emoji counts once; the unit length is looked at first, to stay fast for huge texts.
  if (password.length > PASSWORD_LENGTH_MAX * 2) return `must have at most ${PASSWORD_LENGTH_MAX} characters`;
  const characters = [...password].map((character) => character.codePointAt(0) ?? 0);
  if (characters.length < PASSWORD_LENGTH_MIN) return `must have at least ${PASSWORD_LENGTH_MIN} characters`;
  if (characters.length > PASSWORD_LENGTH_MAX) return `must have at most ${PASSWORD_LENGTH_MAX} characters`;

  const plain = password.normalize('NFC').toLowerCase();
  const stem = plain.replace(/[^\p{L}]+$/u, '');
  if (COMMON_PASSWORDS.has(plain) || COMMON_PASSWORDS.has(stem) || isRun(characters)) {
    return 'is one of the passwords that are tried first; choose another';
  }
  const rest = contextWords(context).reduce((text, word) => text.replaceAll(word, ''), plain);
  const isShorter = rest.length < plain.length;
  const ownCharacters = rest.replace(/[^\p{L}]/gu, '');
  if (isShorter && ownCharacters.length < OWN_CHARACTERS_MIN) {
    return 'is built from a name or address that others know; choose another';
  }
  return undefined;
}

/** Refuses a bad new password. @throws AppError VALIDATION_FAILED naming `field` */
export function assertGoodPassword(password: string, context: PasswordContext, field = 'password'): void {
  const fault = findPasswordFault(password, context);
  if (fault) throw new AppError('VALIDATION_FAILED', { fields: { [field]: [fault] } });
}
