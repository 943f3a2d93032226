import AxeBuilder from '@axe-core/playwright';
import { chromium, type Browser, type Page } from 'playwright-core';
import { expect } from 'vitest';
import { CHROMIUM, CHROMIUM_FLAGS } from '../../../server/tools/in-browser.mjs';

export function openBrowser(): Promise<Browser> {
  return chromium.launch({ executablePath: CHROMIUM, args: [...CHROMIUM_FLAGS] });
}

export interface PageOptions {
  readonly width?: number;
  readonly theme?: 'light' | 'dark';
}

/** A page that keeps what went wrong in it: script errors, and everything the content policy refused. */
export async function openPage(
  browser: Browser,
  { width = 1440, theme = 'light' }: PageOptions = {},
): Promise<{ page: Page; faults: string[] }> {
  const context = await browser.newContext({
    viewport: { width, height: width < 700 ? 844 : 940 },
    colorScheme: theme,
    acceptDownloads: true,
  });
  const page = await context.newPage();
  const faults: string[] = [];
  page.on('pageerror', (error) => faults.push(error.message));
  page.on('console', (message) => {
    if (message.type() === 'error' && /Content.Security.Policy/i.test(message.text()))
      faults.push(message.text());
  });
  return { page, faults };
}

export interface Account {
  readonly email: string;
  readonly password: string;
}

/** The demo account that holds a role. */
export async function demoAccount(url: string, role: string): Promise<Account> {
  const answer = await fetch(`${url}/api/session`);
  const { demo } = (await answer.json()) as { demo: { accounts: (Account & { roles: string[] })[] } };
  return demo.accounts.find(({ roles }) => roles.includes(role))!;
}

export async function signInAs(page: Page, url: string, { email, password }: Account): Promise<void> {
  await page.goto(`${url}/sign-in`);
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password', { exact: true }).fill(password);
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await page.waitForURL((address) => !address.pathname.startsWith('/sign-in'));
}

/** What axe finds on the page as it stands, one line a finding. */
export function axeFindings(page: Page): Promise<string[]> {
  return findingsOf(axeOn(page).withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa']));
}

/** The part of it that depends on the theme. */
export function contrastFindings(page: Page): Promise<string[]> {
  return findingsOf(axeOn(page).withRules(['color-contrast']));
}

/** Without frames of other origins there is nothing to gather in a page of its own, which costs half a second. */
function axeOn(page: Page): AxeBuilder {
  return new AxeBuilder({ page }).setLegacyMode(true);
}

async function findingsOf(builder: AxeBuilder): Promise<string[]> {
  const { violations } = await builder.analyze();
  return violations.map(
    ({ id, nodes }) => `${id}: ${nodes.map(({ html }) => html.slice(0, 120)).join(' | ')}`,
  );
}

export const WIDTHS = [1440, 390] as const;

const isScrollingSideways = (page: Page): Promise<boolean> =>
  page.evaluate('document.documentElement.scrollWidth > document.documentElement.clientWidth + 1');

/** All of axe in the light theme; in the dark one what a theme can change, which is contrast. No sideways scrolling. */
export async function expectSound(page: Page): Promise<void> {
  expect(await axeFindings(page)).toEqual([]);
  expect(await isScrollingSideways(page)).toBe(false);
  await page.emulateMedia({ colorScheme: 'dark' });
  await page.locator('.dark').first().waitFor();
  expect(await contrastFindings(page)).toEqual([]);
  await page.emulateMedia({ colorScheme: 'light' });
}
