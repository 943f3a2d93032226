import { readFileSync } from 'node:fs';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Service } from '../../server/tools/service.mjs';
import { demoAccount, openBrowser, openPage, signInAs } from './support/browser';
import { startProduct } from './support/service';
import { waitUntil } from './support/wait-until';

/** What is done with a record on its page: read with the keyboard, taken away, analysed again. */
describe('the page of a capture', () => {
  let service: Service;
  let browser: Browser;
  let page: Page;
  let captureId: string;

  beforeAll(async () => {
    service = await startProduct({ isDemo: true });
    browser = await openBrowser();
    ({ page } = await openPage(browser));
    await signInAs(page, service.url, await demoAccount(service.url, 'reviewer'));
    await waitUntil(
      async () => {
        const answer = await page.request.get(`${service.url}/api/captures?q=received-tone`);
        const { items } = (await answer.json()) as { items: { id: string; state: string }[] };
        captureId = items[0]?.id ?? '';
        return items[0]?.state === 'done';
      },
      { what: 'the tone is analysed', timeoutMs: 120_000 },
    );
    await page.goto(`${service.url}/captures/${captureId}`);
    // It takes the focus once its traces are there.
    await page.locator('[aria-roledescription=chart][tabindex="0"]').first().waitFor();
  });

  afterAll(async () => {
    await browser?.close();
    await service?.stop();
  });

  const chart = () =>
    page.getByRole('group', { name: 'Spectrum' }).and(page.locator('[aria-roledescription=chart]'));
  const spoken = async (): Promise<string> =>
    (await page.locator('[aria-live=polite]').allTextContents()).join(' ');
  const exported = async (name: string): Promise<Buffer> => {
    await page.getByRole('button', { name: 'Export' }).first().click();
    const [download] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('menuitem', { name }).click(),
    ]);
    return readFileSync(await download.path());
  };

  it('is read with the keyboard: the cursor steps, goes to the harmonics, and says where it is', async () => {
    await chart().focus();
    await page.keyboard.press('n');
    await expect.poll(spoken).toMatch(/dBFS|dBr/);
    const atHarmonic = await spoken();
    await page.keyboard.press('Shift+ArrowRight');
    await expect.poll(spoken).not.toBe(atHarmonic);
    await page.keyboard.press('Escape');
  });

  it('zooms by keyboard and is reset', async () => {
    const reset = page.getByRole('button', { name: 'Reset' }).first();
    expect(await reset.isDisabled()).toBe(true);
    await chart().focus();
    await page.keyboard.press('+');
    await expect.poll(() => reset.isDisabled()).toBe(false);
    await page.keyboard.press('0');
    await expect.poll(() => reset.isDisabled()).toBe(true);
  });

  it('zooms to a box drawn with the mouse', async () => {
    await page.getByRole('button', { name: 'Zoom', exact: true }).first().click();
    const box = (await chart().boundingBox())!;
    await page.mouse.move(box.x + box.width * 0.3, box.y + box.height * 0.3);
    await page.mouse.down();
    await page.mouse.move(box.x + box.width * 0.5, box.y + box.height * 0.6, { steps: 5 });
    await page.mouse.up();
    const reset = page.getByRole('button', { name: 'Reset' }).first();
    await expect.poll(() => reset.isDisabled()).toBe(false);
    await reset.click();
    await page.getByRole('button', { name: 'Cursor', exact: true }).first().click();
  });

  it('gives every point of its traces as CSV, the picture as PNG and the drawing as SVG', async () => {
    const csv = (await exported('Every point, CSV')).toString('utf8');
    const capture = (await (await page.request.get(`${service.url}/api/captures/${captureId}`)).json()) as {
      record: { id: string };
    };
    const detail = (await (
      await page.request.get(`${service.url}/api/records/${capture.record.id}`)
    ).json()) as {
      record: { channels: { traces: { spectrum: { href: string; points: number } } }[] };
    };
    const { href, points } = detail.record.channels[0]!.traces.spectrum;
    const bytes = await (await page.request.get(new URL(href, service.url).href)).body();
    const values = new Float64Array(bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.length));
    const rows = csv
      .trim()
      .split(/\r?\n/)
      .map((line) => line.split(',').map(Number))
      .filter(([x]) => Number.isFinite(x));
    expect(rows).toHaveLength(points);
    expect(rows[1000]![0]).toBeCloseTo(values[1000]!, 4);
    expect(rows[1000]![1]).toBeCloseTo(values[points + 1000]!, 4);

    expect((await exported('Picture, PNG')).subarray(1, 4).toString('latin1')).toBe('PNG');
    const svg = (await exported('Drawing, SVG')).toString('utf8');
    const isDrawing = await page.evaluate((text) => {
      const { documentElement } = new DOMParser().parseFromString(text, 'image/svg+xml');
      return documentElement.tagName === 'svg' && documentElement.querySelectorAll('path').length > 3;
    }, svg);
    expect(isDrawing).toBe(true);
  });

  it('says itself in words, with a table', async () => {
    await page.getByRole('button', { name: 'In words' }).first().click();
    await page.getByRole('table').filter({ hasText: 'Hz' }).first().waitFor();
    await page.getByRole('button', { name: 'In words' }).first().click();
  });

  it('is analysed again with another band: a new record that supersedes, and the old one says so', async () => {
    await page.getByRole('button', { name: /^Band to/ }).click();
    await page
      .getByLabel(/^Band to, /)
      .last()
      .fill('10000');
    await page.getByRole('button', { name: 'Take it' }).click();
    await page.getByRole('button', { name: 'Analyse again' }).click();
    await page.getByText('record 2, current', { exact: true }).waitFor({ timeout: 60_000 });
    await page.getByRole('link', { name: 'record 1' }).first().click();
    await page
      .getByText(/superseded/i)
      .first()
      .waitFor();
    expect(page.url()).toContain('record=');
  });

  it('is computed again by the server and agrees', async () => {
    await page.goto(`${service.url}/captures/${captureId}`);
    await page.getByRole('button', { name: /compute again and compare/i }).click();
    await page
      .getByText(/agrees|no figure differs|the same/i)
      .first()
      .waitFor({ timeout: 60_000 });
  });

  it('goes on after its worker was killed', async () => {
    await page.getByRole('button', { name: /^Band to/ }).click();
    await page
      .getByLabel(/^Band to, /)
      .last()
      .fill('12000');
    await page.getByRole('button', { name: 'Take it' }).click();
    await page.getByRole('button', { name: 'Analyse again' }).click();
    await service.replaceWorker();
    await page.getByText('record 3, current', { exact: true }).waitFor({ timeout: 60_000 });
  });
});
