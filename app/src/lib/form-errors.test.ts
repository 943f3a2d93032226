import { describe, expect, it, vi } from 'vitest';
import { ApiError } from './api-error';
import { placeErrors } from './form-errors';

interface Values {
  email: string;
  name: string;
}

const refusal = (fields: Record<string, string[]>) =>
  new ApiError(400, 'VALIDATION_FAILED', {
    title: 'Not valid',
    detail: 'Some fields are not valid.',
    fields,
  });

describe('what the server refuses of a form', () => {
  it('stands at the field it is about; the first one is focused', () => {
    const setError = vi.fn();
    const left = placeErrors<Values>(
      refusal({ name: ['too long', 'no tabs'], email: ['taken'] }),
      ['email', 'name'],
      setError,
    );
    expect(left).toBeNull();
    expect(setError).toHaveBeenNthCalledWith(
      1,
      'name',
      { type: 'server', message: 'too long. no tabs' },
      { shouldFocus: true },
    );
    expect(setError).toHaveBeenNthCalledWith(
      2,
      'email',
      { type: 'server', message: 'taken' },
      { shouldFocus: false },
    );
  });

  it('is said of the whole form where the form has no such field', () => {
    const setError = vi.fn();
    expect(placeErrors<Values>(refusal({ token: ['spent'] }), ['email'], setError)).toBe('spent');
    expect(setError).not.toHaveBeenCalled();
  });

  it('is said in the server\u2019s words when it names no field at all', () => {
    const error = new ApiError(429, 'TOO_MANY_REQUESTS', { title: 'Too many tries', retryAfterS: 30 });
    expect(placeErrors<Values>(error, ['email'], vi.fn())).toBe('Too many tries. Try again in 30 seconds.');
  });
});
