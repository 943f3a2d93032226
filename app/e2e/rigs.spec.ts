import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { demoAccount, expectSound, openBrowser, openPage, signInAs, WIDTHS } from './support/browser';
import { sharedDemo } from './support/shared-demo';

/** The rigs of the demo bench, from the list to a calibration entered by hand. */
describe('rigs', () => {
  let service: { readonly url: string };
  let browser: Browser;
  beforeAll(async () => {
    service = sharedDemo();
    browser = await openBrowser();
  });
  afterAll(async () => {
    await browser?.close();
  });

  const signedIn = async (width: (typeof WIDTHS)[number]) => {
    const opened = await openPage(browser, { width });
    await signInAs(opened.page, service.url, await demoAccount(service.url, 'technician'));
    return opened;
  };

  it.each(WIDTHS)('have nothing for axe to find at %s px, light and dark', async (width) => {
    const { page, faults } = await signedIn(width);
    await page.goto(`${service.url}/rigs`);
    await page.getByRole('link', { name: 'Window bench' }).waitFor();
    await expectSound(page);
    await page.getByRole('link', { name: 'Window bench' }).click();
    await page.getByText('has an expired calibration').waitFor();
    await expectSound(page);
    for (const name of ['Change the facts', 'Add a calibration', 'Name a baseline']) {
      await page.getByRole('button', { name }).click();
      await page.getByRole('dialog').waitFor();
      await expectSound(page);
      await page.keyboard.press('Escape');
      await page.getByRole('dialog').waitFor({ state: 'detached' });
    }
    expect(faults).toEqual([]);
  });

  it('are calibrated without a pointer, and the newer calibration ends the warning', async () => {
    const { page } = await signedIn(1440);
    await page.locator('main').waitFor();
    await page.keyboard.press('g');
    await page.keyboard.press('r');
    await page.getByRole('link', { name: 'Window bench' }).press('Enter');
    const warning = page.getByText('has an expired calibration');
    await warning.waitFor();
    await page.getByRole('button', { name: 'Add a calibration' }).press('Enter');
    const fill = (label: string, text: string) => page.getByLabel(label, { exact: true }).fill(text);
    await fill('Range or gain', 'line in, pad off, divider');
    await fill('Sample rate (Hz)', '96000');
    await fill('Meter reads (V RMS)', '0.352');
    await fill('Recording shows (dBFS)', '-20');
    await fill('Divider', '10');
    // A tenth of the voltage is 20 dB down; a divider of 10 makes 3.52 V ten times as much.
    await page.getByText(/with a divider of 10 is 35\.2\sV at full scale\./).waitFor();
    await fill('Meter', 'Thornley M6 bench meter, no. 1187');
    await fill('Uncertainty (%)', '0,5');
    await page.getByRole('button', { name: 'Enter it for good' }).press('Enter');
    await page.getByRole('dialog').waitFor({ state: 'detached' });
    await page.getByText(/expired on .*, followed by a newer one/).waitFor();
    expect(await warning.count()).toBe(0);
    expect(await page.getByRole('row', { name: /35\.2\sV RMS ±0\.5\s%/ }).count()).toBe(1);
  });
});
