import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

export default defineConfig({
  resolve: {
    alias: { '@': fileURLToPath(new URL('./src', import.meta.url)) },
    conditions: ['source', 'module', 'node'],
  },
  test: {
    include: ['e2e/**/*.spec.ts'],
    exclude: ['e2e/live-system.spec.ts'], // vitest.sound.config.ts
    globalSetup: './e2e/support/shared-demo-setup.ts',
    environment: 'node',
    // Much of a test is waiting: for sound, for a page to settle. More at once would wait for the processor.
    maxWorkers: 2,
    testTimeout: 120_000,
    hookTimeout: 180_000,
  },
});
