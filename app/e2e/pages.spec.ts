import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { demoAccount, expectSound, openBrowser, openPage, signInAs, WIDTHS } from './support/browser';
import { demoCaptures, sharedDemo } from './support/shared-demo';

type Width = (typeof WIDTHS)[number];

/** Every page of the demo bench, at both widths and in both themes. */
describe('the pages of a bench', () => {
  let service: { readonly url: string };
  let browser: Browser;
  const pages = new Map<string, { page: Page; faults: string[] }>();
  let addresses: Record<string, string>;

  beforeAll(async () => {
    service = sharedDemo();
    browser = await openBrowser();
    for (const width of WIDTHS) {
      for (const role of ['anonymous', 'reviewer', 'administrator']) {
        const opened = await openPage(browser, { width });
        if (role !== 'anonymous') {
          await signInAs(opened.page, service.url, await demoAccount(service.url, role));
        }
        pages.set(`${role} ${width}`, opened);
      }
    }
    const { page } = pages.get('reviewer 1440')!;
    const getJson = async <T>(address: string): Promise<T> =>
      (await (await page.request.get(`${service.url}${address}`)).json()) as T;
    const captures = await demoCaptures(getJson);
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
      live: '/live',
      stimuli: '/stimuli?name=level-steps&rate=48000',
      units: '/units',
      unit: `/units/${units.items[0]!.id}`,
      account: '/account',
      'no such page': '/nowhere',
    };
  });

  afterAll(async () => {
    await browser?.close();
  });

  const visit = async (role: string, width: Width, address: string): Promise<Page> => {
    const { page } = pages.get(`${role} ${width}`)!;
    await page.emulateMedia({ colorScheme: 'light' });
    await page.goto(`${service.url}${address}`);
    await page.getByRole('heading', { level: 1 }).waitFor();
    await page.waitForLoadState('networkidle');
    return page;
  };

  describe.each(WIDTHS)(
    'at %s px, light and dark: nothing for axe to find, no sideways scrolling',
    (width) => {
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
        'live',
        'stimuli',
        'units',
        'unit',
        'account',
        'no such page',
      ])('%s', async (name) => {
        await expectSound(await visit('reviewer', width, addresses[name]!));
      });

      it.each(['/people', '/people/audit', '/people/jobs', '/people/mail', '/'])(
        'administrator at %s',
        async (address) => {
          await expectSound(await visit('administrator', width, address));
        },
      );

      it.each(['/sign-in', '/lost-password'])('before signing in, at %s', async (address) => {
        await expectSound(await visit('anonymous', width, address));
      });
    },
  );

  it('met no script error and nothing that the content policy refused', () => {
    expect([...pages.values()].flatMap(({ faults }) => faults)).toEqual([]);
  });
});
