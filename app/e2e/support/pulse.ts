import { spawn, spawnSync, type ChildProcess } from 'node:child_process';
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { waitUntil } from './wait-until';

/** A system's audio of our own: an output, a bent unit behind it, an input, and an output that leads nowhere. */
export interface PulseBench {
  /** For the browser. */
  readonly env: Readonly<Record<string, string>>;
  readonly pactl: (...args: readonly string[]) => string;
  readonly stop: () => Promise<void>;
}

export const OUTPUT_NAME = 'Bench_output';
export const INPUT_NAME = 'Bench_input';

const BEND = fileURLToPath(new URL('./bend.mjs', import.meta.url));

/**
 * Starts PulseAudio with null sinks, apart from any that runs already, and a process that bends what is played.
 *
 * @param rateHz - of everything in it
 */
export async function startPulse(rateHz: number): Promise<PulseBench> {
  const folder = mkdtempSync(path.join(tmpdir(), 'benchlark-pulse-'));
  const socket = path.join(folder, 'native');
  for (const name of ['home', 'run', 'config']) mkdirSync(path.join(folder, name), { mode: 0o700 });
  writeFileSync(
    path.join(folder, 'daemon.conf'),
    [
      `default-sample-rate = ${rateHz}`,
      `alternate-sample-rate = ${rateHz}`,
      'default-sample-format = float32le',
    ]
      .concat('default-sample-channels = 2')
      .join('\n'),
  );
  const sink = (name: string, words: string) =>
    `load-module module-null-sink sink_name=${name} rate=${rateHz} format=float32le channels=2 sink_properties=device.description=${words}`;
  writeFileSync(
    path.join(folder, 'bench.pa'),
    [
      `load-module module-native-protocol-unix socket=${socket} auth-anonymous=1`,
      sink('played', OUTPUT_NAME),
      sink('returned', 'Return_path'),
      sink('elsewhere', 'Elsewhere'),
      // The browser hides monitors, and shows what is made from them.
      `load-module module-remap-source master=returned.monitor source_name=heard remix=no source_properties=device.description=${INPUT_NAME}`,
      'set-default-sink elsewhere',
      'set-default-source heard',
    ].join('\n'),
  );
  const env = {
    ...process.env,
    HOME: path.join(folder, 'home'),
    XDG_RUNTIME_DIR: path.join(folder, 'run'),
    XDG_CONFIG_HOME: path.join(folder, 'config'),
    PULSE_CONFIG: path.join(folder, 'daemon.conf'),
    PULSE_SERVER: `unix:${socket}`,
  } as Record<string, string>;
  const children: ChildProcess[] = [
    spawn(
      'pulseaudio',
      [
        '-n',
        '-F',
        path.join(folder, 'bench.pa'),
        '--daemonize=no',
        '--exit-idle-time=-1',
        '--use-pid-file=no',
        '--realtime=no',
      ],
      { env, stdio: 'ignore' },
    ),
  ];
  const pactl = (...args: readonly string[]): string => {
    const { status, stdout, stderr } = spawnSync('pactl', [...args], { env, encoding: 'utf8' });
    if (status !== 0) throw new Error(`pactl ${args.join(' ')}: ${stderr}`);
    return stdout;
  };
  await waitUntil(() => Promise.resolve(spawnSync('pactl', ['info'], { env }).status === 0), {
    what: 'PulseAudio answers',
    timeoutMs: 20_000,
  });
  const format = ['--raw', '--format=float32le', `--rate=${rateHz}`, '--channels=2', '--latency-msec=60'];
  const from = spawn('parec', ['-d', 'played.monitor', ...format], {
    env,
    stdio: ['ignore', 'pipe', 'ignore'],
  });
  const bend = spawn(process.execPath, [BEND], { stdio: ['pipe', 'pipe', 'inherit'] });
  const to = spawn('pacat', ['-d', 'returned', ...format], { env, stdio: ['pipe', 'ignore', 'ignore'] });
  from.stdout.pipe(bend.stdin);
  bend.stdout.pipe(to.stdin);
  // A pipe that breaks at the end is the end.
  for (const stream of [bend.stdin, to.stdin]) stream.on('error', () => undefined);
  children.push(from, bend, to);
  return {
    env,
    pactl,
    stop: async () => {
      for (const child of children.reverse()) child.kill('SIGTERM');
      await Promise.all(
        children.map((child) =>
          child.exitCode !== null || child.signalCode !== null
            ? Promise.resolve()
            : new Promise((resolve) => child.once('exit', resolve)),
        ),
      );
      rmSync(folder, { recursive: true, force: true });
    },
  };
}
