import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Service } from '../../server/tools/service.mjs';
import { axeFindings, demoAccount, openBrowser, openPage, signInAs } from './support/browser';
import { startProduct } from './support/service';
import { waitUntil } from './support/wait-until';

const SIZES = [
  { width: 1440, theme: 'light' },
  { width: 1440, theme: 'dark' },
  { width: 390, theme: 'light' },
  { width: 390, theme: 'dark' },
] as const;

/** Every page of the demo bench, at both widths and in both themes. */
describe('the pages of a bench', () => {
  let service: Service;
  let browser: Browser;
  const pages = new Map<string, { page: Page; faults: string[] }>();
  let addresses: Record<string, string>;

  beforeAll(async () => {
    service = await startProduct({ isDemo: true });
    browser = await openBrowser();
    for (const size of SIZES) {
      for (const role of ['anonymous', 'reviewer', 'administrator']) {
        const opened = await openPage(browser, size);
        if (role !== 'anonymous') {
          await signInAs(opened.page, service.url, await demoAccount(service.url, role));
        }
        pages.set(`${role} ${size.width} ${size.theme}`, opened);
      }
    }
    const { page } = pages.get('reviewer 1440 light')!;
    const getJson = async <T>(address: string): Promise<T> =>
      (await (await page.request.get(`${service.url}${address}`)).json()) as T;
    const listStates = async () =>
      (await getJson<{ items: { id: string; fileName: string; state: string }[] }>('/api/captures?limit=50'))
        .items;
    await waitUntil(async () => (await listStates()).every(({ state }) => state === 'done'), {
      what: 'the demo captures are analysed',
      timeoutMs: 120_000,
    });
    const captures = await listStates();
    const named = (part: string): string => captures.find(({ fileName }) => fileName.includes(part))!.id;
    const units = await getJson<{ items: { id: string }[] }>('/api/units');
    addresses = {
      today: '/',
      archive: '/archive',
      'capture of a tone': `/captures/${named('received-tone')}`,
      'capture of silence': `/captures/${named('received-idle')}`,
      'capture of a quiet tone': `/captures/${named('received-low')}`,
      'capture of a programme': `/captures/${named('candle-220417-programme')}`,
      'level steps of a programme': `/captures/${named('candle-220417-programme')}?segment=4`,
      'sweep of a programme': `/captures/${named('candle-220417-programme')}?segment=5`,
      'separation of a programme': `/captures/${named('candle-220417-programme')}?segment=6`,
      'jitter of a programme': `/captures/${named('candle-220417-programme')}?segment=12`,
      stimuli: '/stimuli?name=level-steps&rate=48000',
      units: '/units',
      unit: `/units/${units.items[0]!.id}`,
      account: '/account',
      'no such page': '/nowhere',
    };
  });

  afterAll(async () => {
    await browser?.close();
    await service?.stop();
  });

  const visit = async (
    role: string,
    { width, theme }: (typeof SIZES)[number],
    address: string,
  ): Promise<Page> => {
    const { page } = pages.get(`${role} ${width} ${theme}`)!;
    await page.goto(`${service.url}${address}`);
    await page.getByRole('heading', { level: 1 }).waitFor();
    await page.waitForLoadState('networkidle');
    return page;
  };

  const isScrollingSideways = (page: Page): Promise<boolean> =>
    page.evaluate('document.documentElement.scrollWidth > document.documentElement.clientWidth + 1');

  describe.each(SIZES)('at $width px, $theme', (size) => {
    it.each([
      'today',
      'archive',
      'capture of a tone',
      'capture of silence',
      'capture of a quiet tone',
      'capture of a programme',
      'level steps of a programme',
      'sweep of a programme',
      'separation of a programme',
      'jitter of a programme',
      'stimuli',
      'units',
      'unit',
      'account',
      'no such page',
    ])('%s: nothing for axe to find, and no sideways scrolling', async (name) => {
      const page = await visit('reviewer', size, addresses[name]!);
      expect(await axeFindings(page)).toEqual([]);
      expect(await isScrollingSideways(page)).toBe(false);
    });

    it.each(['/people', '/people/audit', '/people/jobs', '/people/mail', '/'])(
      'administrator at %s',
      async (address) => {
        const page = await visit('administrator', size, address);
        expect(await axeFindings(page)).toEqual([]);
        expect(await isScrollingSideways(page)).toBe(false);
      },
    );

    it.each(['/sign-in', '/lost-password'])('before signing in, at %s', async (address) => {
      const page = await visit('anonymous', size, address);
      expect(await axeFindings(page)).toEqual([]);
      expect(await isScrollingSideways(page)).toBe(false);
    });
  });

  it('met no script error and nothing that the content policy refused', () => {
    expect([...pages.values()].flatMap(({ faults }) => faults)).toEqual([]);
  });
});
