import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Service } from '../../server/tools/service.mjs';
import { demoAccount, openBrowser, openPage, signInAs } from './support/browser';
import { runCli } from './support/cli';
import { startProduct } from './support/service';

/** Somebody new comes to the bench, loses a password, and lets the command line in. */
describe('joining a bench', () => {
  let service: Service;
  let browser: Browser;
  let administrator: Page;
  let newcomer: Page;
  let link: string;

  beforeAll(async () => {
    service = await startProduct({ isDemo: true });
    browser = await openBrowser();
    ({ page: administrator } = await openPage(browser));
    ({ page: newcomer } = await openPage(browser));
    await signInAs(administrator, service.url, await demoAccount(service.url, 'administrator'));
  });

  afterAll(async () => {
    await browser?.close();
    await service?.stop();
  });

  /** The link in the newest letter to an address, read on the page of sent mail. */
  const linkInLetter = async (address: string): Promise<string> => {
    let text = '';
    await expect
      .poll(
        async () => {
          await administrator.goto(`${service.url}/people/mail`);
          const letter = administrator.locator('details', { hasText: address }).first();
          if ((await letter.count()) === 0) return '';
          text = (await letter.locator('pre').textContent()) ?? '';
          return text;
        },
        { timeout: 30_000 },
      )
      .toContain('#');
    return /http\S+#\S+/.exec(text)?.[0] ?? '';
  };

  it('invites by letter, and the letter stands on the page of sent mail', async () => {
    await administrator.goto(`${service.url}/people`);
    await administrator.getByRole('button', { name: 'Invite somebody' }).click();
    const dialog = administrator.getByRole('dialog');
    await dialog.getByLabel('E-mail').fill('henrike@quarry-lane.example');
    await dialog.getByLabel('technician').check();
    await dialog.getByRole('button', { name: 'Invite', exact: true }).click();
    await administrator.getByText('The letter is on its way').waitFor();
    link = await linkInLetter('henrike@quarry-lane.example');
    expect(link).toContain(`${service.url}/invitation#`);
  });

  it('lets the invited person in, with the roles of the invitation alone', async () => {
    await newcomer.goto(link);
    await newcomer.getByLabel('Your name').fill('Henrike Abt');
    await newcomer.getByLabel('Password', { exact: true }).fill('a cup of tea at half past six');
    await newcomer.getByRole('button', { name: 'Join the bench' }).click();
    await newcomer.getByText('Henrike Abt').first().waitFor();
    expect(await newcomer.getByRole('link', { name: 'People and audit' }).count()).toBe(0);
    expect(newcomer.url()).not.toContain('#');
    const refused = await newcomer.request.get(`${service.url}/api/people`);
    expect(refused.status()).toBe(403);
  });

  it('takes an invitation once', async () => {
    const { page } = await openPage(browser);
    await page.goto(link);
    await page
      .getByText(/used already|has run out/i)
      .first()
      .waitFor();
    await page.context().close();
  });

  it('makes a token with which the command line archives, until it is withdrawn', async () => {
    const folder = mkdtempSync(path.join(tmpdir(), 'benchlark-e2e-'));
    const recording = path.join(folder, 'from the command line.wav');
    execFileSync('sox', [
      '-n',
      '-r',
      '48000',
      '-b',
      '16',
      '-c',
      '2',
      recording,
      'synth',
      '2',
      'sine',
      '440',
      'vol',
      '0.3',
    ]);
    await newcomer.goto(`${service.url}/account`);
    await newcomer.getByLabel('What the token is for').fill('bench laptop');
    await newcomer.getByRole('button', { name: 'Make a token' }).click();
    const token = await newcomer.locator('code', { hasText: /^blk_/ }).textContent();
    const sent = await runCli('upload', recording, '--to', service.url, '--token', token ?? '');
    expect(sent).toMatchObject({ code: 0 });
    const { number } = /capture (?<number>\d+)/.exec(sent.stdout)!.groups!;
    await newcomer.goto(`${service.url}/archive`);
    await newcomer.getByRole('link', { name: number, exact: true }).first().waitFor();

    await newcomer.goto(`${service.url}/account`);
    await newcomer.getByRole('button', { name: 'Withdraw bench laptop' }).click();
    const confirm = newcomer.getByRole('alertdialog').getByRole('button', { name: /withdraw/i });
    if (await confirm.isVisible().catch(() => false)) await confirm.click();
    await expect
      .poll(
        async () => (await runCli('upload', recording, '--to', service.url, '--token', token ?? '')).stderr,
      )
      .toContain('401');
    rmSync(folder, { recursive: true, force: true });
  });

  it('gives a new password by letter, which ends the open sessions and works once', async () => {
    const { page } = await openPage(browser);
    await page.goto(`${service.url}/lost-password`);
    await page.getByLabel('E-mail').fill('henrike@quarry-lane.example');
    await page.getByRole('button', { name: 'Send me a link' }).click();
    let reset = '';
    await expect
      .poll(async () => (reset = await linkInLetter('henrike@quarry-lane.example')), { timeout: 30_000 })
      .toContain('/reset#');
    await page.goto(reset);
    await page.getByLabel('New password', { exact: true }).fill('a cup of coffee at eleven');
    await page.getByRole('button', { name: 'Set this password' }).click();
    await page.getByText('The new password is set').waitFor();
    expect((await newcomer.request.get(`${service.url}/api/me`)).status()).toBe(401);
    await signInAs(page, service.url, {
      email: 'henrike@quarry-lane.example',
      password: 'a cup of coffee at eleven',
    });
    await page.goto(reset);
    await page.reload();
    await page.getByLabel('New password', { exact: true }).fill('another cup of cold coffee');
    await page.getByRole('button', { name: 'Set this password' }).click();
    await page
      .getByText(/used already|has run out/i)
      .first()
      .waitFor();
  });
});
