import react from '@vitejs/plugin-react';
import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

const serverUrl = process.env['BENCHLARK_SERVER_URL'] ?? 'http://127.0.0.1:4870';

export default defineConfig({
  plugins: [react()],
  resolve: {
    alias: { '@': fileURLToPath(new URL('./src', import.meta.url)) },
    conditions: ['source', 'module', 'browser', 'development|production'],
  },
  worker: { format: 'es' },
  build: { assetsInlineLimit: 0, sourcemap: false, chunkSizeWarningLimit: 900 },
  server: { host: '127.0.0.1', port: 4871, proxy: { '/api': { target: serverUrl } } },
  test: {
    include: ['src/**/*.test.{ts,tsx}'],
    environment: 'jsdom',
    setupFiles: ['./src/test-setup.ts'],
    // As many as the smallest machine has processors: by itself it would leave one idle.
    maxWorkers: 2,
  },
});
