import type { TestProject } from 'vitest/node';
import type {} from './shared-demo';
import { startProduct } from './service';

/** Starts the shared demo bench, whose filling and analysing takes longer than most specs; ends it after the last. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const service = await startProduct({ isDemo: true });
  project.provide('demoUrl', service.url);
  return () => service.stop();
}
