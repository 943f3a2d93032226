import { ApiError } from './api-error';
import { formatCount } from './format/quantity';

/** What went wrong and what to do, as one or more sentences. */
export function errorWords(error: unknown): string {
  if (!(error instanceof ApiError)) return 'This page met something it did not expect. Load it again.';
  const { facts } = error;
  const parts = [sentence(facts.detail ?? facts.title)];
  if (facts.found !== undefined) parts.push(sentence(`Found: ${facts.found}`));
  if (facts.remedy !== undefined) parts.push(sentence(facts.remedy));
  if (facts.retryAfterS !== undefined) parts.push(`Try again in ${formatCount(facts.retryAfterS)} seconds.`);
  if (error.status >= 500 && facts.requestId !== undefined)
    parts.push(`The log has it as ${facts.requestId}.`);
  return parts.join(' ');
}

/** "at byte 1 024", or nothing. */
export function offsetWords(error: ApiError): string {
  return error.facts.offset === undefined ? '' : `at byte ${formatCount(error.facts.offset)}`;
}

function sentence(text: string): string {
  return /[.?]$/.test(text) ? text : `${text}.`;
}
