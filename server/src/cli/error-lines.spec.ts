import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { runCli } from './run-cli';

const folder = mkdtempSync(join(tmpdir(), 'benchlark-lines-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

async function cli(line: string): Promise<{ code: number; err: string }> {
  let err = '';
  const io = { cwd: folder, out: () => undefined, err: (text: string) => (err += text), isWatched: false };
  return { code: await runCli(line.split(' '), io), err };
}

beforeAll(async () => {
  expect((await cli('stimulus sine --rate 44100 --bits 16 --duration 1 --out tone.wav')).code).toBe(0);
  writeFileSync(
    join(folder, 'lame.json'),
    JSON.stringify({
      schema: 'benchlark-device/1',
      name: 'lame',
      stages: [{ kind: 'clip', positive: 1 }],
    }),
  );
  writeFileSync(join(folder, 'broken.json'), '{"schema":');
});

describe('an error line', () => {
  it.each([
    ['analyse --channel left nofile.wav', 3, 'nofile.wav: there is no such file'],
    ['analyse tone.wav --stimulus nofile.json', 3, 'nofile.json: there is no such file'],
    ['analyse tone.wav --stimulus lame.json', 3, "lame.json: the stimulus's descriptor has"],
    ['analyse tone.wav --baseline broken.json', 3, 'broken.json: is not JSON'],
    ['analyse --band 30000:40000 tone.wav', 2, 'tone.wav: a band from 30000 Hz'],
    ['analyse --json --channel centre tone.wav', 2, 'tone.wav: --channel takes left, right, all'],
    [
      'practice tone.wav out.wav --device lame.json',
      3,
      'lame.json: the practice device has nothing at stages[0] (clip).negative',
    ],
    ['practice nofile.wav out.wav --device clean', 3, 'nofile.wav: there is no such file'],
    ['practice tone.wav nowhere/out.wav --device clean', 3, 'nowhere/out.wav: there is no such'],
    ['stimulus sine --rate 48000 --out nowhere/x.wav', 3, 'nowhere/x.wav: there is no such'],
    ['verify broken.json tone.wav', 3, 'broken.json: is not JSON'],
    ['verify lame.json tone.wav', 3, 'lame.json: the record has'],
  ])('of "%s" ends with %i and names the file at fault', async (line, code, words) => {
    const answer = await cli(line);
    expect(answer.err).toContain(`benchlark: ${words}`);
    expect(answer.err.trimEnd().split('\n')).toHaveLength(1);
    expect(answer.code).toBe(code);
  });
});

describe('practice', () => {
  it('never writes over the recording', async () => {
    const before = readFileSync(join(folder, 'tone.wav'));
    const { code, err } = await cli('practice tone.wav ./tone.wav --device clean');
    expect(code).toBe(2);
    expect(err).toContain('another file');
    expect(readFileSync(join(folder, 'tone.wav')).equals(before)).toBe(true);
  });
});
