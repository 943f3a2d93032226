import { describe, expect, it } from 'vitest';
import { nextPath } from './next-path';

const ORIGIN = 'https://bench.example';

describe('where to go after signing in', () => {
  it('is the page that was asked for', () => {
    expect(nextPath('/archive?q=hum#top', ORIGIN)).toBe('/archive?q=hum#top');
  });

  // The usual ways round a check of an address's beginning: common practice, no source.
  it.each([
    null,
    '',
    'archive',
    'https://elsewhere.example/',
    '//elsewhere.example/',
    '/\\elsewhere.example/',
    '/\t/elsewhere.example/',
    '\\\\elsewhere.example',
    'javascript:alert(1)',
    '/sign-in?next=/sign-in',
  ])('is Today for %j', (next) => {
    expect(nextPath(next, ORIGIN)).toBe('/');
  });
});
