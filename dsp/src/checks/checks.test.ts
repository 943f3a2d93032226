import { describe, expect, it } from 'vitest';
import { allChecks, checksByTopic } from './all-checks.js';

describe.each(Object.entries(checksByTopic))('%s', (_topic, checks) => {
  it.each(checks.map((check) => [check.id, check] as const))('%s', async (_id, check) => {
    const value = await check.compute();
    expect(
      Math.abs(value - check.expected),
      `${value} ${check.unit}, expected ${check.expected} (${check.source})`,
    ).toBeLessThanOrEqual(check.tolerance);
  });
});

it('names each check once', () => {
  const ids = allChecks.map(({ id }) => id);
  expect(new Set(ids).size).toBe(ids.length);
});
