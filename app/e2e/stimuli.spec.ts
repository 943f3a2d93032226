import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { createStimulus, encodeWavBlocks, parseDescriptor } from '@benchlark/dsp';
import type { Browser, Download, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { demoAccount, openBrowser, openPage, signInAs } from './support/browser';
import { sharedDemo } from './support/shared-demo';

/** A stimulus is chosen, set word by word, and taken away as a file with its descriptor. */
describe('the stimuli', () => {
  let service: { readonly url: string };
  let browser: Browser;
  let page: Page;

  beforeAll(async () => {
    service = sharedDemo();
    browser = await openBrowser();
    ({ page } = await openPage(browser));
    await signInAs(page, service.url, await demoAccount(service.url, 'technician'));
  });

  afterAll(async () => {
    await browser?.close();
  });

  /** Both files that one press of the button brings, by their names. */
  const makeFile = async (): Promise<Map<string, Buffer>> => {
    const downloads: Download[] = [];
    const collect = (download: Download): void => void downloads.push(download);
    page.on('download', collect);
    await page.getByRole('button', { name: 'Make the file' }).click();
    await page.getByText('are in your downloads').waitFor({ timeout: 60_000 });
    await expect.poll(() => downloads.length, { timeout: 20_000 }).toBe(2);
    page.off('download', collect);
    const files = new Map<string, Buffer>();
    for (const download of downloads) {
      files.set(download.suggestedFilename(), readFileSync(await download.path()));
    }
    return files;
  };

  it('is reached by the rail, and chosen from the list', async () => {
    await page.getByRole('link', { name: 'Stimuli', exact: true }).click();
    await page.getByRole('heading', { level: 1, name: 'Stimuli' }).waitFor();
    await page.getByRole('link', { name: 'Jitter test' }).click();
    await page.getByRole('heading', { level: 2, name: 'Jitter test' }).waitFor();
    await page.getByText('Bit for bit.').waitFor();
    expect(new URL(page.url()).searchParams.get('name')).toBe('jitter-test');
  });

  it.each([
    {
      name: 'jitter-test',
      address: 'name=jitter-test&rate=48000&bits=16',
      options: {},
      stem: 'jitter-test-48k-16bit',
    },
    {
      name: 'difference-pair',
      address: 'name=difference-pair&rate=48000&bits=24&level=-6&duration=2',
      options: { levelDbfs: -6, durationS: 2 },
      stem: 'difference-pair-48k-24bit-minus6db-2s',
    },
  ])('$name comes as the very bytes that dsp writes', async ({ name, address, options, stem }) => {
    await page.goto(`${service.url}/stimuli?${address}`);
    const files = await makeFile();
    const bits = address.includes('bits=16') ? 16 : 24;
    const stimulus = createStimulus(name, { sampleRateHz: 48_000, bitsPerSample: bits, ...options });
    const hash = createHash('sha256');
    for await (const block of encodeWavBlocks(stimulus.source, stimulus.encoding)) hash.update(block);
    const expected = hash.digest('hex');
    const wav = files.get(`${stem}.wav`)!;
    expect(createHash('sha256').update(wav).digest('hex')).toBe(expected);
    const descriptor = parseDescriptor(JSON.parse(files.get(`${stem}.json`)!.toString()));
    expect(descriptor).toEqual(stimulus.describe(expected));
  });

  it('says at the word what can’t be, and draws again once it can', async () => {
    await page.goto(`${service.url}/stimuli?name=sine&rate=48000`);
    await page.getByRole('heading', { name: 'What it holds' }).waitFor();
    await page.getByRole('button', { name: /^Level, / }).click();
    await page.getByRole('textbox', { name: 'Level, dBFS' }).fill('3');
    await page.keyboard.press('Enter');
    await page
      .getByRole('alert')
      .getByText(/The level must be from −160 to 0 dBFS/)
      .first()
      .waitFor();
    await page.keyboard.press('Escape');
    await expect.poll(() => page.getByRole('dialog').count()).toBe(0);
    await page.getByRole('button', { name: /^Level, / }).click();
    await page.getByRole('textbox', { name: 'Level, dBFS' }).fill('-12');
    await page.keyboard.press('Enter');
    await expect.poll(() => page.getByRole('alert').count()).toBe(0);
    expect(new URL(page.url()).searchParams.get('level')).toBe('-12');
  });
});
