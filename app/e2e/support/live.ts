import { writeFile } from 'node:fs/promises';
import { encodeWav } from '@benchlark/dsp';
import type { Page } from 'playwright-core';

/** Opens the practice device; with faults by their names on the page and the value that is typed. */
export async function openPractice(
  page: Page,
  url: string,
  faults: Readonly<Record<string, string>> = {},
): Promise<void> {
  await page.goto(`${url}/live`);
  for (const [label, value] of Object.entries(faults)) await setNumber(page, label, value);
  await page.getByRole('button', { name: 'Open the practice device' }).click();
  await page.getByRole('button', { name: /^(Play|Start the take)/ }).waitFor();
}

/** Types a number into a word of a sentence. */
export async function setNumber(page: Page, label: string, value: string): Promise<void> {
  await page.getByRole('button', { name: new RegExp(`^${label}, `) }).click();
  const dialog = page.getByRole('dialog', { name: label });
  await dialog.getByRole('textbox').fill(value);
  await page.keyboard.press('Enter');
  await dialog.waitFor({ state: 'hidden' });
}

export async function choose(page: Page, label: string, option: RegExp): Promise<void> {
  await page.getByRole('button', { name: new RegExp(`^${label}, `) }).click();
  await page.getByRole('menuitemradio', { name: option }).click();
  await page.getByRole('menu').waitFor({ state: 'hidden' });
}

/** A figure of the live table, as it stands. */
export async function liveFigure(page: Page, row: string, channel: 'left' | 'right'): Promise<number> {
  const rows = page.locator('.bl-live-figures').getByRole('row', { name: new RegExp(`^${row} dB`) });
  const text = await rows
    .getByRole('cell')
    .nth(channel === 'left' ? 0 : 1)
    .innerText();
  return Number(/[−-]?\d+(\.\d+)?/.exec(text.replace(/\s/g, ''))?.[0].replace('−', '-') ?? NaN);
}

/** A stereo file for the browser's stand-in for a microphone: 32-bit floats that loop without a seam. */
export async function writeFakeCapture(path: string): Promise<void> {
  const sampleRateHz = 44_100;
  const frameCount = 10 * sampleRateHz;
  const sine = (hz: number, peak: number) =>
    Float64Array.from(
      { length: frameCount },
      (_, n) => peak * Math.sin((2 * Math.PI * hz * n) / sampleRateHz),
    );
  const bytes = encodeWav([sine(997, 10 ** (-6 / 20)), sine(1499, 10 ** (-12 / 20))], {
    sampleRateHz,
    bits: '32f',
    dither: 'none',
    seed: 0,
  });
  await writeFile(path, bytes);
}
