import { readFileSync } from 'node:fs';
import { resolve } from 'node:path';
import { parseEnv } from './env.schema';

/** The example's lines as a process would get them. */
function readExample(): Record<string, string> {
  const text = readFileSync(resolve(__dirname, '../../.env.example'), 'utf8');
  const lines = text.split('\n').filter((line) => line !== '' && !line.startsWith('#'));
  return Object.fromEntries(
    lines.map((line) => [line.slice(0, line.indexOf('=')), line.slice(line.indexOf('=') + 1)]),
  );
}

describe('.env.example', () => {
  const example = readExample();
  const usable: Record<string, string> = { ...example, SESSION_SECRET: 'f'.repeat(64) };

  it('can be used once its secret is replaced, and not before', () => {
    expect(parseEnv(usable)).toMatchObject({ NODE_ENV: 'production', STORAGE_KIND: 'folder', DEMO: false });
    expect(() => parseEnv(example)).toThrow('SESSION_SECRET');
  });

  it('names every variable there is, with its default', () => {
    const optional = ['SMTP_URL', 'S3_ENDPOINT', 'S3_BUCKET', 'S3_ACCESS_KEY_ID', 'S3_SECRET_ACCESS_KEY'];
    const needed = ['NODE_ENV', 'PUBLIC_URL', 'DATABASE_URL', 'SESSION_SECRET'] as const;
    const minimal = Object.fromEntries(needed.map((name) => [name, usable[name]]));
    const defaults = parseEnv(minimal);
    expect(Object.keys(example).sort()).toEqual([...new Set([...Object.keys(defaults), ...optional])].sort());
    expect(parseEnv(usable)).toEqual(defaults);
  });
});
