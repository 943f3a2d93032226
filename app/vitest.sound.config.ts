import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

/** Plays and records through the operating system in real time: alone, so that nothing else holds the processor. */
export default defineConfig({
  resolve: {
    alias: { '@': fileURLToPath(new URL('./src', import.meta.url)) },
    conditions: ['source', 'module', 'node'],
  },
  test: {
    include: ['e2e/live-system.spec.ts'],
    environment: 'node',
    fileParallelism: false,
    testTimeout: 120_000,
    hookTimeout: 180_000,
  },
});
