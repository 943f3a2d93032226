import { setTimeout as pause } from 'node:timers/promises';

/** For set-up code, where Vitest's `expect.poll` can't be called. */
export async function waitUntil(
  isSo: () => Promise<boolean>,
  { what, timeoutMs }: { what: string; timeoutMs: number },
): Promise<void> {
  const deadlineMs = performance.now() + timeoutMs;
  while (!(await isSo())) {
    if (performance.now() > deadlineMs) throw new Error(`${what}: not so after ${timeoutMs / 1000} s`);
    await pause(200);
  }
}
