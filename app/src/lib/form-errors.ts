import type { FieldPath, FieldValues, UseFormSetError } from 'react-hook-form';
import { ApiError } from './api-error';
import { errorWords } from './error-words';

/**
 * Puts the server's messages on the fields they are about.
 *
 * @param fields - the fields that the form shows
 * @returns what is left to say about the form as a whole, or null when every message found its field
 */
export function placeErrors<Values extends FieldValues>(
  error: unknown,
  fields: readonly FieldPath<Values>[],
  setError: UseFormSetError<Values>,
): string | null {
  if (!(error instanceof ApiError) || !error.facts.fields) return errorWords(error);
  const leftOver: string[] = [];
  let hasFocused = false;
  for (const [path, messages] of Object.entries(error.facts.fields)) {
    const field = fields.find((known) => known === path);
    if (!field) {
      leftOver.push(...messages);
      continue;
    }
    setError(field, { type: 'server', message: messages.join('. ') }, { shouldFocus: !hasFocused });
    hasFocused = true;
  }
  return leftOver.length > 0 ? leftOver.join('. ') : hasFocused ? null : errorWords(error);
}
