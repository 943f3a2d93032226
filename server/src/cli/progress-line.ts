import type { CliIo } from './cli-io';

/** Shows the share done on one line of standard error, where a person watches. */
export function createProgressLine(
  io: CliIo,
  what: string,
): { show: (share: number) => void; clear: () => void } {
  let shown = -1;
  return {
    show(share) {
      const percent = Math.floor(share * 100);
      if (!io.isWatched || percent === shown) return;
      shown = percent;
      io.err(`\r${what} ${percent} %`);
    },
    clear() {
      if (shown >= 0) io.err('\r\u001b[K');
      shown = -1;
    },
  };
}
