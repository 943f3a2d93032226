import { runCli } from './run-cli';

/** npm runs scripts in the project's root; INIT_CWD is where the person stands. */
const cwd = process.env['INIT_CWD'] ?? process.cwd();

/** A reader that has seen enough, as `head` has, closes the pipe: nobody is left to write for. */
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  if (error.code !== 'EPIPE') throw error;
  process.exit();
});

runCli(process.argv.slice(2), {
  cwd,
  out: (text) => process.stdout.write(text),
  err: (text) => process.stderr.write(text),
  isWatched: process.stderr.isTTY,
}).then(
  (code) => {
    process.exitCode = code;
  },
  (error: unknown) => {
    process.stderr.write(
      `benchlark: a fault of the program: ${error instanceof Error ? error.stack : String(error)}\n`,
    );
    process.exitCode = 1;
  },
);
