import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { allChecks as checks } from '../../dsp/src/checks/all-checks';
import { openInBrowserPage } from '../../server/tools/in-browser.mjs';
import type { CheckResult } from './in-browser/in-browser.worker';

describe('the measuring code in a Chromium worker', () => {
  let harness: Awaited<ReturnType<typeof openInBrowserPage>>;
  let inBrowser: Map<string, number>;

  beforeAll(async () => {
    harness = await openInBrowserPage();
    const results = await harness.page.evaluate<CheckResult[]>('runChecks()');
    inBrowser = new Map(results.map(({ id, computed }) => [id, computed]));
  });

  afterAll(() => harness?.close());

  it.each(checks.map((check) => ({ id: check.id, check })))(
    'agrees with the published value: $id',
    ({ check }) => {
      const computed = inBrowser.get(check.id);
      expect(computed).toBeDefined();
      expect(Math.abs(computed! - check.expected)).toBeLessThanOrEqual(check.tolerance);
    },
  );

  it('gives what Node gives, to the last places', async () => {
    let largest = { id: '', difference: 0 };
    for (const check of checks) {
      const difference = Math.abs((inBrowser.get(check.id) ?? NaN) - (await check.compute()));
      expect(difference, check.id).not.toBeNaN();
      if (difference > largest.difference) largest = { id: check.id, difference };
    }
    console.log(
      `${checks.length} checks in Node and in Chromium: largest difference ${largest.difference} (${largest.id})`,
    );
    // Engines may differ in the last bit of sin, cos and log10; a thousand-millionth of a dB leaves room for that alone.
    expect(largest.difference).toBeLessThan(1e-9);
  });
});
