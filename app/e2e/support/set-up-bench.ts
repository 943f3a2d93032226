import type { Page } from 'playwright-core';
import type { Service } from '../../../server/tools/service.mjs';

/** Makes an empty bench's first administrator with the secret printed at the start; that person is then signed in. */
export async function setUpBench(page: Page, service: Service): Promise<void> {
  const secret = /secret[^\n]*?[:\s]([A-Za-z0-9_-]{16,})/i.exec(service.log)?.[1];
  if (!secret) throw new Error(`no secret was printed: ${service.log}`);
  await page.goto(service.url);
  await page.getByLabel('One-time secret').fill(secret);
  await page.getByLabel('Name of the bench').fill('Quarry Lane');
  await page.getByLabel('Your name').fill('Oda Lindqvist');
  await page.getByLabel('Your e-mail').fill(OWNER.email);
  await page.getByLabel('Password', { exact: true }).fill(OWNER.password);
  await page.getByRole('button', { name: /set up|begin|make/i }).click();
  await page.waitForURL((address) => !address.pathname.includes('set-up'));
}

/** Signs in again on another browser. */
export const OWNER = { email: 'oda@quarry-lane.example', password: 'a long walk by the weir' };
