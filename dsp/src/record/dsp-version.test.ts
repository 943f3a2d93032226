import { readFileSync } from 'node:fs';
import { expect, it } from 'vitest';
import { DSP_VERSION } from './dsp-version.js';

it('states the version of the package that is built', () => {
  const manifest: unknown = JSON.parse(readFileSync(new URL('../../package.json', import.meta.url), 'utf8'));
  expect(manifest).toMatchObject({ version: DSP_VERSION });
});
