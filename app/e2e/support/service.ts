import { startService, type Service } from '../../../server/tools/service.mjs';

/** Starts the built product on a database of its own; `DEMO` fills it with the demo bench. */
export function startProduct(options: { isDemo: boolean }): Promise<Service> {
  const adminUrl = process.env['TEST_DATABASE_URL'];
  if (!adminUrl) throw new Error('TEST_DATABASE_URL is not set: run `npm test -- --only e2e`');
  return startService({
    adminUrl,
    env: { DEMO: String(options.isDemo) },
    seed: options.isDemo ? 'demo/seed.js' : null,
  });
}
