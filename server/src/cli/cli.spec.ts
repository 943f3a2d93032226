import { execFileSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, truncateSync, writeFileSync } from 'node:fs';
import { createServer, type Server } from 'node:http';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { BenchRecord, StimulusDescriptor } from '@benchlark/dsp';
import { printRecord } from './print-record';
import { runCli } from './run-cli';

const folder = mkdtempSync(join(tmpdir(), 'benchlark-cli-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

async function cli(...argv: string[]): Promise<{ code: number; out: string; err: string }> {
  let out = '';
  let err = '';
  const code = await runCli(argv, {
    cwd: folder,
    out: (text) => (out += text),
    err: (text) => (err += text),
    isWatched: false,
  });
  return { code, out, err };
}

const readJson = <T>(name: string): T => JSON.parse(readFileSync(join(folder, name), 'utf8')) as T;

/** One-sided clip at 0.8 of the peak: measured harmonics must be the closed form's. */
const CLIPPING = {
  schema: 'benchlark-device/1',
  name: 'upper half clipped',
  sampleRateHz: 96000,
  seed: 1,
  stages: [{ kind: 'clip', channel: 'left', positive: 0.4, negative: 1 }],
};

beforeAll(async () => {
  writeFileSync(join(folder, 'device.json'), JSON.stringify(CLIPPING));
  expect(
    (
      await cli(
        'stimulus',
        'sine',
        '--rate',
        '96000',
        '--bits',
        '24',
        '--level',
        '-6.0206',
        '--duration',
        '4',
        '--out',
        'tone.wav',
      )
    ).code,
  ).toBe(0);
  expect((await cli('practice', 'tone.wav', 'clipped.wav', '--device', 'device.json')).code).toBe(0);
});

describe('stimulus', () => {
  it('writes a descriptor with the hash of the bytes beside the file', () => {
    const descriptor = readJson<StimulusDescriptor>('tone.json');
    const sum = execFileSync('sha256sum', [join(folder, 'tone.wav')], { encoding: 'utf8' });
    expect(descriptor.sha256).toBe(sum.split(' ')[0]);
    expect(descriptor).toMatchObject({
      schema: 'benchlark-stimulus/1',
      name: 'sine',
      sampleRateHz: 96000,
      bitsPerSample: 24,
    });
  });

  it.each([
    [['stimulus', 'sine', '--bits', '24', '--out', 'x.wav'], '--rate is missing'],
    [['stimulus', 'sine', '--rate', '48000', '--bits', '20', '--out', 'x.wav'], '--bits takes 16, 24, 32f'],
    [['stimulus', 'sine', '--rate', '48000', '--out', 'x.flac'], 'ending in .wav'],
    [['stimulus', 'hiss', '--rate', '48000', '--out', 'x.wav'], 'hiss'],
  ])('refuses %j as wrong usage', async (argv, words) => {
    const { code, err, out } = await cli(...argv);
    expect(code).toBe(2);
    expect(err).toContain(words);
    expect(err.trimEnd().split('\n')).toHaveLength(1);
    expect(out).toBe('');
  });
});

describe('analyse', () => {
  it('prints the record alone, recognised by its marks, with the harmonics of the closed form', async () => {
    const { code, out, err } = await cli('analyse', 'clipped.wav', '--json', '--traces', 'none');
    expect(err).toBe('');
    expect(code).toBe(0);
    const record = JSON.parse(out) as BenchRecord;
    expect(record).toMatchObject({
      schema: 'benchlark-record/1',
      measure: 'tone',
      stimulus: { recognisedBy: 'marks' },
    });
    const [left, right] = record.channels;
    // Fourier series of a sine clipped on one side at 0.8 of its peak: H2 -26.312 dB, H3 -28.250 dB (closed form,
    // checked by quadrature); 24-bit dither and the ramps leave 0.01 dB.
    expect(left?.harmonics[0]?.levelDbr).toBeCloseTo(-26.312, 2);
    expect(left?.harmonics[1]?.levelDbr).toBeCloseTo(-28.25, 2);
    expect(right?.figures['fundamentalLevelDbfs']).toBeCloseTo(-6.0206, 3);
    expect(left?.traces).toEqual({});
  });

  it('prints a table for people, and says what it took the file for', async () => {
    const { out } = await cli('analyse', 'clipped.wav');
    expect(out).toContain('Taken for');
    expect(out).toMatch(/THD\s+-2\d\.\d+.*dB/);
    expect(out).toContain('Harmonic 2');
  });

  it('cuts a programme up, proposes what it shows, and agrees with its own record', async () => {
    const made = await cli(
      'stimulus',
      'programme',
      '--quick',
      '--rate',
      '48000',
      '--bits',
      '24',
      '--out',
      'programme.wav',
    );
    expect(made.code).toBe(0);
    expect(
      (await cli('practice', 'programme.wav', 'pinched.wav', '--device', 'pinched-converter')).code,
    ).toBe(0);
    const json = await cli('analyse', 'pinched.wav', '--json');
    writeFileSync(join(folder, 'pinched.json'), json.out);
    const out = printRecord(JSON.parse(json.out) as BenchRecord);
    // The device clips at 0.763 of full scale: 20 lg 0.763 = -2.35 dBFS.
    expect(out).toContain('fault: Left is cut off on its positive half from -2.35 dBFS up');
    for (const measure of ['tone', 'level-steps', 'sweep', 'separation', 'two-tone', 'jitter']) {
      expect(out).toContain(`== ${measure} (`);
    }
    expect(out).toMatch(/played\s+deviation dB\s+THD dB/);
    expect((await cli('verify', 'pinched.json', 'pinched.wav')).code).toBe(0);
  }, 180_000);

  it('takes channel, segment and band from the command line into the settings', async () => {
    const { out } = await cli(
      'analyse',
      'clipped.wav',
      '--measure',
      'tone',
      '--channel',
      'left',
      '--from',
      '3',
      '--to',
      '5',
      '--band',
      '100:10000',
      '--json',
    );
    const record = JSON.parse(out) as BenchRecord;
    expect(record.channels.map(({ channel }) => channel)).toEqual(['left']);
    expect(record.settings).toMatchObject({ fromS: 3, toS: 5, bandLowHz: 100, bandHighHz: 10000 });
  });

  it.each([
    [['analyse'], 2, 'missing'],
    [['analyse', 'clipped.wav', '--band', '20000:20'], 2, '--band takes LOW:HIGH'],
    [['analyse', 'clipped.wav', '--measure', 'loudest'], 2, '--measure takes'],
    [['analyse', 'clipped.wav', '--from', '900', '--to', '901'], 2, '900'],
    [['analyse', 'none.wav'], 3, 'none.wav: there is no such file'],
    [['analyse', 'device.json'], 3, 'device.json'],
  ])('ends %j with %i', async (argv, exitCode, words) => {
    const { code, err, out } = await cli(...argv);
    expect(err).toContain(words);
    expect(err).toMatch(/^benchlark: /);
    expect(err.trimEnd().split('\n')).toHaveLength(1);
    expect(code).toBe(exitCode);
    expect(out).toBe('');
  });

  it('ends with 4 when a file holds nothing that can be measured', async () => {
    await cli('stimulus', 'silence', '--rate', '48000', '--duration', '2', '--out', 'silence.wav');
    const { code, err } = await cli('analyse', 'silence.wav', '--measure', 'tone');
    expect(err).toMatch(/^benchlark: silence\.wav: /);
    expect(code).toBe(4);
  });
});

describe('verify', () => {
  beforeAll(async () => {
    const { out } = await cli('analyse', 'clipped.wav', '--json');
    writeFileSync(join(folder, 'record.json'), out);
  });

  it('agrees with the recording the record was made from', async () => {
    expect(await cli('verify', 'record.json', 'clipped.wav')).toMatchObject({ code: 0 });
  });

  it('agrees when descriptor, channel and band were given', async () => {
    const { out } = await cli(
      'analyse',
      'clipped.wav',
      '--stimulus',
      'tone.json',
      '--channel',
      'right',
      '--band',
      '50:15000',
      '--json',
    );
    writeFileSync(join(folder, 'record-2.json'), out);
    const { code, out: said, err } = await cli('verify', 'record-2.json', 'clipped.wav');
    expect({ code, err, said }).toMatchObject({ code: 0, err: '' });
  });

  it('names the figure that was altered', async () => {
    const record = readJson<{ channels: { figures: Record<string, number> }[] }>('record.json');
    record.channels[0]!.figures['thdDb']! += 0.001;
    writeFileSync(join(folder, 'altered.json'), JSON.stringify(record));
    const { code, out } = await cli('verify', 'altered.json', 'clipped.wav');
    expect(out).toContain('channels.0.figures.thdDb');
    expect(out.trimEnd().split('\n')).toHaveLength(1);
    expect(code).toBe(5);
  });

  it('refuses a recording of other bytes', async () => {
    const { code, err } = await cli('verify', 'record.json', 'tone.wav');
    expect(err).toContain('not those the record was made from');
    expect(code).toBe(5);
  });

  it('says what is wrong with a record that is none', async () => {
    const { code, err } = await cli('verify', 'device.json', 'clipped.wav');
    expect(err).toContain('device.json');
    expect(code).toBe(3);
  });
});

describe('inspect', () => {
  it('goes on after a bad file and gives one line a file', async () => {
    writeFileSync(join(folder, 'text.wav'), 'this is no recording');
    const { code, out } = await cli('inspect', 'tone.wav', 'text.wav', 'clipped.wav', '--json');
    const lines = out
      .trimEnd()
      .split('\n')
      .map((line) => JSON.parse(line) as Record<string, unknown>);
    expect(code).toBe(3);
    expect(lines[0]).toMatchObject({
      file: 'tone.wav',
      capture: { sampleRateHz: 96000, channelCount: 2, bitsPerSample: 24 },
      warnings: [],
    });
    expect(lines[1]).toMatchObject({ file: 'text.wav', error: { code: 'WAV_NOT_RIFF', offset: 0 } });
    // Only the positive half is clipped: the negative one still reaches half of full scale, give or take the dither.
    expect((lines[2] as { capture: { peakFs: number[] } }).capture.peakFs[0]).toBeCloseTo(0.5, 5);
  });

  it('warns of a recorder that was cut off', async () => {
    execFileSync('cp', [join(folder, 'tone.wav'), join(folder, 'cut.wav')]);
    truncateSync(join(folder, 'cut.wav'), 1_000_001);
    const { code, out } = await cli('inspect', 'cut.wav', '--json');
    const line = JSON.parse(out) as { warnings: { code: string }[] };
    expect(code).toBe(0);
    expect(line.warnings.length).toBeGreaterThan(0);
  });
});

describe('upload', () => {
  let server: Server;
  let url: string;
  const seen: { authorization: string | undefined; bytes: number }[] = [];

  beforeAll(async () => {
    // Only the border is played here: the real server stands in the end-to-end tests.
    server = createServer((request, response) => {
      let bytes = 0;
      request.on('data', (chunk: Buffer) => (bytes += chunk.length));
      request.on('end', () => {
        seen.push({ authorization: request.headers.authorization, bytes });
        const isGood = request.headers.authorization === 'Bearer good';
        response.writeHead(isGood ? 201 : 401, { 'content-type': 'application/json' });
        response.end(
          JSON.stringify(
            isGood
              ? { id: 'abc', number: 7, sameBytesAs: [{ number: 3 }] }
              : { code: 'SIGNED_OUT', detail: 'the token is not known' },
          ),
        );
      });
    });
    await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
    const address = server.address();
    url = `http://127.0.0.1:${typeof address === 'object' ? address?.port : ''}`;
  });
  afterAll(() => new Promise((resolve) => server.close(resolve)));

  it('sends each file whole and names the capture it became', async () => {
    const { code, out } = await cli('upload', 'tone.wav', 'clipped.wav', '--to', url, '--token', 'good');
    expect(code).toBe(0);
    expect(out).toContain(`tone.wav: capture 7, the same bytes as capture 3: ${url}/captures/abc`);
    expect(seen).toHaveLength(2);
    expect(seen[0]!.bytes).toBeGreaterThan(readFileSync(join(folder, 'tone.wav')).length);
  });

  it('says what the server refused', async () => {
    const { code, err } = await cli('upload', 'tone.wav', '--to', url, '--token', 'bad');
    expect(err).toBe('benchlark: tone.wav: 401 SIGNED_OUT: the token is not known\n');
    expect(code).toBe(3);
  });

  it('goes on after a file that is not there, and says when the server is away', async () => {
    const missing = await cli('upload', 'none.wav', 'tone.wav', '--to', url, '--token', 'good');
    expect(missing.code).toBe(3);
    expect(missing.out).toContain('tone.wav: capture 7');
    const away = await cli('upload', 'tone.wav', '--to', 'http://127.0.0.1:9', '--token', 'good');
    expect(away.err).toContain("can't be reached");
    expect(away.code).toBe(3);
  });
});

describe('usage', () => {
  it('prints help for every command, and names the commands for an unknown one', async () => {
    expect(await cli('analyse', '--help')).toMatchObject({ code: 0, err: '' });
    expect((await cli('measure')).err).toContain('analyse, inspect, verify, stimulus, practice, upload');
    expect((await cli()).code).toBe(2);
  });
});

describe('sums of a bench', () => {
  const record = async (wav: string, ...more: string[]): Promise<string> => {
    const name = wav.replace('.wav', '.record.json');
    const { out, code } = await cli('analyse', wav, '--json', ...more);
    expect(code).toBe(0);
    writeFileSync(join(folder, name), out);
    return name;
  };
  const through = async (from: string, to: string, stages: unknown[]): Promise<void> => {
    const device = { schema: 'benchlark-device/1', name: 'bench', sampleRateHz: null, seed: 1, stages };
    writeFileSync(join(folder, `${to}.device.json`), JSON.stringify(device));
    expect((await cli('practice', from, to, '--device', `${to}.device.json`)).code).toBe(0);
  };

  it('tell the impedance of a known divider, and a bound where the load takes nothing', async () => {
    // 0.5 ohm into 8 ohms takes 20 lg(8.5 / 8) = 0.5266 dB (Ohm's law).
    await through('tone.wav', 'loaded.wav', [
      { kind: 'gain', channel: 'both', gainDb: -20 * Math.log10(8.5 / 8) },
    ]);
    const open = await record('tone.wav', '--measure', 'tone');
    const loaded = await record('loaded.wav', '--measure', 'tone');
    const told = await cli('impedance', open, loaded, '--load', '8');
    expect(told.out).toMatch(/left: at 997 Hz the load takes 0\.526\d dB: 0\.500 ohm .*damping factor 16\.0/);
    expect((await cli('impedance', open, open, '--load', '8')).out).toMatch(
      /below 0\.0026 ohm, no more can be told/,
    );
    expect((await cli('impedance', open, '--load', '8')).code).toBe(2);
  });

  it('tell the power at a limit, and how far a flat stage is from the replay curve', async () => {
    await cli('stimulus', 'level-steps', '--rate', '48000', '--level', '0', '--out', 'steps.wav');
    await through('steps.wav', 'clipping.wav', [
      { kind: 'clip', channel: 'both', positive: 0.5, negative: 0.5 },
      { kind: 'noise', channel: 'both', levelDbfs: -110 },
    ]);
    const steps = await record('clipping.wav');
    writeFileSync(
      join(folder, 'volts.json'),
      JSON.stringify({
        schema: 'benchlark-calibration/1',
        date: '2026-01-02',
        channels: ['left', 'right'].map((channel) => ({ channel, fullScaleVrms: 20, expandedPercent: 1 })),
      }),
    );
    const { out } = await cli('power', steps, '--calibration', 'volts.json', '--load', '8', '--json');
    const [left] = JSON.parse(out) as { atLimits: { powerW: number; lowW: number; highW: number }[] }[];
    // Cut off at half of full scale, 1 % is reached at a peak of 0.5 / 0.971487 (Fourier series of a clipped sine).
    const about = (20 * (0.5 / 0.971487)) ** 2 / 8;
    const { powerW, lowW, highW } = left!.atLimits[1]!;
    expect(Math.abs(10 * Math.log10(powerW / about))).toBeLessThan(0.3);
    expect(lowW).toBeLessThan(powerW);
    expect(highW).toBeGreaterThan(powerW);

    await cli('stimulus', 'sweep', '--rate', '48000', '--out', 'sweep.wav');
    const sweep = await record('sweep.wav');
    // The published table has +19.27 dB at 20 Hz and -19.62 dB at 20 kHz.
    expect((await cli('phono', sweep)).out).toMatch(
      /left: \+19\.[56]\d dB from the replay curve at (19|20)\d\d\d Hz/,
    );
    expect((await cli('phono', steps)).err).toMatch(/a sweep's record is needed/);
  });
});
