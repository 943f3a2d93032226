import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { demoAccount, openBrowser, openPage, signInAs } from './support/browser';
import { demoCaptures, sharedDemo } from './support/shared-demo';

/** A programme's record: what is proposed, the table of its parts, each in full, and back. */
describe('a programme on its page', () => {
  let service: { readonly url: string };
  let browser: Browser;
  let page: Page;
  let captureId: string;

  beforeAll(async () => {
    service = sharedDemo();
    browser = await openBrowser();
    ({ page } = await openPage(browser));
    await signInAs(page, service.url, await demoAccount(service.url, 'reviewer'));
    const captures = await demoCaptures(async (address) =>
      (await page.request.get(`${service.url}${address}`)).json(),
    );
    captureId = captures.find(({ fileName }) => fileName.includes('candle-220417-programme'))!.id;
    await page.goto(`${service.url}/captures/${captureId}`);
    await page.getByRole('heading', { name: 'What the programme holds' }).waitFor();
  });

  afterAll(async () => {
    await browser?.close();
  });

  it('says what the pinched output does, as the demo’s device was told to', async () => {
    // The practice device clips the left channel's positive half at 0.763 of full scale: 20 lg 0.763 = -2.35 dBFS.
    const margin = page.getByRole('complementary', { name: 'Margin' });
    await margin.getByText('Left is cut off on its positive half from −2.35 dBFS up').waitFor();
    expect(await margin.getByText(/^Right is cut off/).count()).toBe(0);
  });

  it('opens a part in full by its row, and comes back', async () => {
    await page.getByRole('link', { name: 'level steps' }).click();
    await page.getByRole('heading', { name: /Part 4 of 14: level steps/ }).waitFor();
    expect(new URL(page.url()).searchParams.get('segment')).toBe('4');
    await page.getByRole('heading', { name: 'Deviation from linear' }).waitFor();
    await page.getByRole('link', { name: 'The next part' }).click();
    await page.getByRole('heading', { name: /Part 5 of 14: sweep/ }).waitFor();
    await page.getByRole('link', { name: 'All parts' }).click();
    await page.getByRole('heading', { name: 'What the programme holds' }).waitFor();
  });

  it('draws levels against the stimulus, the recorder or the unit', async () => {
    await page.goto(`${service.url}/captures/${captureId}?segment=4`);
    await page.getByRole('button', { name: /^Levels against, / }).click();
    const choices = page.getByRole('menuitemradio');
    await expect.poll(() => choices.count()).toBe(3);
    await choices.nth(1).click();
    await page
      .getByText(/recorder/i)
      .first()
      .waitFor();
  });

  it('was computed alike by the server’s own second look', async () => {
    await page.goto(`${service.url}/captures/${captureId}`);
    await page.getByRole('button', { name: 'Compute again and compare' }).click();
    await page
      .getByText(/agree|same|holds/i)
      .first()
      .waitFor({ timeout: 60_000 });
  });
});
