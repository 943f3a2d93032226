import type { BenchRecord } from '@benchlark/dsp';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Service } from '../../server/tools/service.mjs';
import { openBrowser, openPage } from './support/browser';
import { runCli } from './support/cli';
import { makePublicRecordings, type PublicRecordings } from './support/public-recordings';
import { startProduct } from './support/service';
import { setUpBench } from './support/set-up-bench';

interface ListedCapture {
  readonly id: string;
  readonly fileName: string;
  readonly sha256: string;
  readonly state: string;
  readonly record: { readonly id: string } | null;
}

/** One bench from its first minute to a damaged object; each test goes on where the one before it ended. */
describe('from an empty bench to a trusted record', () => {
  let service: Service;
  let browser: Browser;
  let page: Page;
  let faults: string[];
  let folder: string;
  let files: PublicRecordings;

  beforeAll(async () => {
    folder = mkdtempSync(path.join(tmpdir(), 'benchlark-e2e-'));
    files = makePublicRecordings(folder);
    service = await startProduct({ isDemo: false });
    browser = await openBrowser();
    ({ page, faults } = await openPage(browser));
  });

  afterAll(async () => {
    await browser?.close();
    await service?.stop();
    rmSync(folder, { recursive: true, force: true });
  });

  const getJson = async <T>(address: string): Promise<T> =>
    (await (await page.request.get(`${service.url}${address}`)).json()) as T;
  const listCaptures = async (): Promise<readonly ListedCapture[]> =>
    (await getJson<{ items: ListedCapture[] }>('/api/captures?sort=number&order=asc')).items;

  it('makes the first administrator with the secret printed at the start', async () => {
    await setUpBench(page, service);
    const answer = await page.request.post(`${service.url}/api/setup`, { data: {} });
    expect([403, 404]).toContain(answer.status());
  });

  it('takes in recordings written by public tools, and shows them arrive', async () => {
    await page.goto(`${service.url}/archive`);
    const { soxExtensible, ffmpegRf64, sndfileFloat } = files;
    await page
      .getByLabel('Recordings to add', { exact: true })
      .setInputFiles([soxExtensible, ffmpegRf64, sndfileFloat]);
    for (const file of [soxExtensible, ffmpegRf64, sndfileFloat]) {
      await page.getByText(path.basename(file)).first().waitFor();
    }
    await expect
      .poll(async () => (await listCaptures()).map(({ state }) => state), { timeout: 60_000 })
      .toEqual(['done', 'done', 'done']);
  });

  it('refuses a compressed file with its code and keeps nothing', async () => {
    await page.getByLabel('Recordings to add', { exact: true }).setInputFiles(files.sndfileAlaw);
    await page.getByText(/WAV_COMPRESSED, at byte 20/).waitFor();
    expect(await listCaptures()).toHaveLength(3);
  });

  it('stores equal bytes once and names the twin', async () => {
    await page.getByLabel('Recordings to add', { exact: true }).setInputFiles(files.soxExtensible);
    await page.getByText('nothing is stored twice').waitFor();
    const twins = (await listCaptures()).filter(
      ({ fileName }) => fileName === path.basename(files.soxExtensible),
    );
    expect(twins).toHaveLength(2);
    expect(twins[0]?.sha256).toBe(twins[1]?.sha256);
  });

  it('opens a record on the page, with its charts and figures', async () => {
    const capture = (await listCaptures())[0];
    await page.goto(`${service.url}/captures/${capture?.id}`);
    await page.getByRole('heading', { level: 1 }).waitFor();
    await page.getByRole('heading', { name: 'Spectrum' }).waitFor();
    await page.getByRole('heading', { name: 'Residual over the wave' }).waitFor();
    // Half of full scale is -6.02 dBFS for a sine (AES17: a full-scale sine reads 0 dBFS).
    await page.getByText('−6.02').first().waitFor();
  });

  it.each(['sox extensible.wav', 'ffmpeg rf64.wav', 'sndfile float.wav'])(
    'gives the figures of the command line, key by key: %s',
    async (name) => {
      const capture = (await listCaptures()).find(({ fileName }) => fileName === name);
      const { record } = await getJson<{ record: BenchRecord }>(`/api/records/${capture?.record?.id}`);
      const { code, stdout, stderr } = await runCli('analyse', path.join(folder, name), '--json');
      expect(stderr).toBe('');
      expect(code).toBe(0);
      const printed = JSON.parse(stdout) as BenchRecord;
      expect(record.capture).toEqual(printed.capture);
      expect(record.settings).toEqual(printed.settings);
      expect(record.warnings).toEqual(printed.warnings);
      for (const [index, channel] of printed.channels.entries()) {
        const { figures, limits, uncertainty, harmonics } = record.channels[index]!;
        expect({ figures, limits, uncertainty, harmonics }).toEqual({
          figures: channel.figures,
          limits: channel.limits,
          uncertainty: channel.uncertainty,
          harmonics: channel.harmonics,
        });
      }
    },
  );

  it('verifies a downloaded record, and names the object of which one byte was altered', async () => {
    const capture = (await listCaptures()).find(({ fileName }) => fileName === 'ffmpeg rf64.wav');
    const recordFile = path.join(folder, 'record.json');
    const download = await page.request.get(
      `${service.url}/api/records/${capture?.record?.id}/download?format=json`,
    );
    writeFileSync(recordFile, await download.body());
    const wav = path.join(folder, 'ffmpeg rf64.wav');
    expect(await runCli('verify', recordFile, wav)).toMatchObject({ code: 0 });

    const sha256 = capture!.sha256;
    const object = findObject(service.storeDir, sha256);
    const bytes = readFileSync(object);
    const middle = bytes.length >> 1;
    bytes[middle] = bytes[middle]! ^ 1;
    writeFileSync(object, bytes);

    const refused = await runCli('verify', recordFile, object);
    expect(refused.code).toBe(5);
    expect(refused.stderr).toContain(sha256);

    await page.goto(`${service.url}/captures/${capture?.id}`);
    await page.getByRole('button', { name: /compute again and compare/i }).click();
    await page
      .getByText(/damaged|not the bytes|bytes differ/i)
      .first()
      .waitFor();
  });

  it('met no script error and nothing that the content policy refused', () => {
    expect(faults).toEqual([]);
  });
});

function findObject(storeDir: string, sha256: string): string {
  return path.join(storeDir, sha256.slice(0, 2), sha256.slice(2, 4), sha256);
}
