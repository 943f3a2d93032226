import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { chromium, type Browser, type Page } from 'playwright-core';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { CHROMIUM, CHROMIUM_FLAGS } from '../../server/tools/in-browser.mjs';
import type { Service } from '../../server/tools/service.mjs';
import { axeFindings, openBrowser, openPage, signInAs } from './support/browser';
import { choose, liveFigure, openPractice, writeFakeCapture } from './support/live';
import { startProduct } from './support/service';
import { OWNER, setUpBench } from './support/set-up-bench';

const AGREES = /The server gets the same from the stored bytes/;

let service: Service;

beforeAll(async () => {
  service = await startProduct({ isDemo: false });
});

afterAll(async () => {
  await service?.stop();
});

/** The Live page in a real browser, a practice device in the signal's way. */
describe('the Live page', () => {
  let browser: Browser;
  let page: Page;
  let faults: string[];

  beforeAll(async () => {
    browser = await openBrowser();
    ({ page, faults } = await openPage(browser));
    await setUpBench(page, service);
  });

  beforeEach(async () => {
    await page.goto(`${service.url}/`);
    await page.evaluate('localStorage.clear()');
  });

  afterAll(async () => {
    await browser?.close();
  });

  it('reads a known device’s second harmonic and level off a steady tone, and keeps it as a take', async () => {
    // x + a x² has a second harmonic of a A / 2 (multiple-angle formulas): 40 dB under a full-scale tone is 60 dB
    // under one 20 dB lower.
    await openPractice(page, service.url, { 'Second harmonic': '-40' });
    await page.keyboard.press('Space');
    await expect.poll(() => liveFigure(page, 'Level', 'left'), { timeout: 20_000 }).toBeCloseTo(-21.5, 1);
    await expect.poll(() => liveFigure(page, 'THD', 'left'), { timeout: 20_000 }).toBeCloseTo(-60, 1);
    await page.getByRole('heading', { name: 'Residual over the wave' }).waitFor();
    expect(await axeFindings(page)).toEqual([]);
    await page.waitForTimeout(3000);
    await page.keyboard.press('k');
    await page.getByText(AGREES).waitFor({ timeout: 60_000 });
    await page.keyboard.press('Escape');
    await page.getByRole('button', { name: /^Play/ }).waitFor();
    await page.getByRole('link', { name: /^Capture \d+/ }).click();
    await page
      .getByText(/practice/i)
      .first()
      .waitFor();
  });

  it('takes the quick programme, shows it as the archive will, and agrees with the server key by key', async () => {
    await openPractice(page, service.url, { 'Left cut off at': '-2.35' });
    await choose(page, 'Signal', /^the quick programme/);
    await page.keyboard.press('Space');
    await page.getByText(/Playing and recording/).waitFor();
    await page.getByRole('button', { name: 'the quick programme', exact: true }).click({ timeout: 90_000 });
    await page.getByRole('heading', { name: 'What the programme holds' }).waitFor();
    await page.getByRole('link', { name: 'level steps' }).click();
    await page.getByRole('heading', { name: 'Deviation from linear' }).waitFor();
    expect(await axeFindings(page)).toEqual([]);
    await page.getByRole('button', { name: 'Keep', exact: true }).click();
    await page.getByText(AGREES).waitFor({ timeout: 120_000 });
  });

  it('stops a take by Esc, keeps what was recorded, and has it after the tab was closed', async () => {
    await openPractice(page, service.url);
    await choose(page, 'Signal', /^a take of a tone/);
    await page.keyboard.press('Space');
    await page.getByText(/Playing and recording/).waitFor();
    await page.waitForTimeout(6000);
    await page.keyboard.press('Escape');
    await page.getByText('in this browser alone').waitFor({ timeout: 30_000 });
    await page.getByText('Stopped.').waitFor();
    const context = page.context();
    await page.close();
    page = await context.newPage();
    await page.goto(`${service.url}/live`);
    await page.getByText('in this browser alone').waitFor();
    await context.setOffline(true);
    await page.getByRole('button', { name: 'Keep', exact: true }).click();
    await page.getByText(/Kept here until it can be sent/).waitFor();
    await context.setOffline(false);
    await page.getByText(AGREES).waitFor({ timeout: 60_000 });
  });

  it('throws a take away only after asking', async () => {
    await openPractice(page, service.url);
    await choose(page, 'Signal', /^a take of silence/);
    await page.keyboard.press('Space');
    await page.getByText(/Playing and recording/).waitFor();
    await page.keyboard.press('Escape');
    await page.getByRole('button', { name: 'Throw away' }).first().click({ timeout: 30_000 });
    await page.getByRole('alertdialog').getByRole('button', { name: 'Not yet' }).click();
    const take = page.getByRole('button', { name: 'a take of silence', exact: true });
    await take.waitFor();
    await page.getByRole('button', { name: 'Throw away' }).first().click();
    await page.getByRole('alertdialog').getByRole('button', { name: 'Throw it away' }).click();
    await expect.poll(() => take.count()).toBe(0);
  });

  it('names what differs when one sample of the archive’s copy is another', async () => {
    await page.addInitScript(() => {
      type Set = (this: FormData, name: string, value: string | Blob, fileName?: string) => void;
      const set: Set = FormData.prototype.set;
      const setOther: Set = function (this: FormData, name, value, fileName) {
        if (!(value instanceof Blob)) return set.call(this, name, value);
        const at = Math.floor(value.size / 2 / 8) * 8;
        const other = new Blob([value.slice(0, at), new Uint8Array([0, 0, 0, 63]), value.slice(at + 4)]);
        return set.call(this, name, other, fileName);
      };
      FormData.prototype.set = setOther;
    });
    await openPractice(page, service.url);
    await page.keyboard.press('Space');
    await page.waitForTimeout(6000);
    await page.keyboard.press('k');
    await page.getByText(/keys came out otherwise/).waitFor({ timeout: 60_000 });
    await page.getByText('capture.sha256').waitFor();
    await page
      .getByText(/channels\.[01]\.figures/)
      .first()
      .waitFor();
  });

  it('met no script error and nothing that the content policy refused', () => {
    expect(faults).toEqual([]);
  });
});

/** The browser's own stand-in for a microphone, which plays a file. */
describe('an input of the browser', () => {
  let browser: Browser;
  let page: Page;
  let folder: string;

  beforeAll(async () => {
    folder = await mkdtemp(path.join(tmpdir(), 'benchlark-live-'));
    const file = path.join(folder, 'input.wav');
    await writeFakeCapture(file);
    browser = await chromium.launch({
      executablePath: CHROMIUM,
      args: [
        ...CHROMIUM_FLAGS,
        '--use-fake-ui-for-media-stream',
        '--use-fake-device-for-media-stream',
        `--use-file-for-fake-audio-capture=${file}`,
      ],
    });
    ({ page } = await openPage(browser));
    await signInAs(page, service.url, OWNER);
    // Keeps hold of the tracks and of what is read off them, as a cable and a busy system would.
    await page.addInitScript(() => {
      const held = window as unknown as { tracks: MediaStreamTrack[]; damage: number };
      held.tracks = [];
      held.damage = 0;
      const media = navigator.mediaDevices;
      const open = media.getUserMedia.bind(media);
      media.getUserMedia = async (constraints) => {
        const stream = await open(constraints);
        held.tracks.push(...stream.getAudioTracks());
        return stream;
      };
      const scope = globalThis as unknown as {
        MediaStreamTrackProcessor: new (init: object) => { readable: ReadableStream<AudioData> };
      };
      const Original = scope.MediaStreamTrackProcessor;
      scope.MediaStreamTrackProcessor = class {
        readable: ReadableStream<AudioData>;
        constructor(init: object) {
          const zeroed = new TransformStream<AudioData, AudioData>({
            transform: (data, controller) => {
              if (held.damage === 0) return controller.enqueue(data);
              held.damage -= 1;
              const { numberOfFrames, numberOfChannels, sampleRate, timestamp } = data;
              data.close();
              controller.enqueue(
                new AudioData({
                  format: 'f32-planar',
                  numberOfFrames,
                  numberOfChannels,
                  sampleRate,
                  timestamp,
                  data: new Float32Array(numberOfFrames * numberOfChannels),
                }),
              );
            },
          });
          this.readable = new Original(init).readable.pipeThrough(zeroed);
        }
      };
    });
  });

  afterAll(async () => {
    await browser?.close();
    if (folder) await rm(folder, { recursive: true, force: true });
  });

  const confirmCaution = async (): Promise<void> => {
    const dialog = page.getByRole('alertdialog');
    for (const box of await dialog.getByRole('checkbox').all()) await box.click();
    await dialog.getByRole('button', { name: 'Play' }).click();
  };

  it('is opened at its own rate, and says what it really delivers', async () => {
    await page.goto(`${service.url}/live`);
    await choose(page, 'Bench', /^an interface/);
    await choose(page, 'Sample rate', /^44.1/);
    await page.getByRole('button', { name: 'Open the interface' }).click();
    await page.getByRole('heading', { name: 'What is delivered' }).waitFor();
    const margin = page.getByRole('complementary', { name: 'Margin' });
    await margin.getByText('44.1 kHz', { exact: true }).waitFor();
    await margin.getByText('off the track itself').waitFor();
    await margin.getByText('floats').waitFor({ timeout: 15_000 });
  });

  it('plays nothing before the caution is confirmed, box by box', async () => {
    await page.keyboard.press('Space');
    const dialog = page.getByRole('alertdialog');
    await dialog.getByText(/can destroy tweeters and hearing/).waitFor();
    expect(await dialog.getByRole('button', { name: 'Play' }).isDisabled()).toBe(true);
    expect(await axeFindings(page)).toEqual([]);
    await confirmCaution();
    await page.getByRole('button', { name: /^Stop the tone/ }).waitFor();
  });

  it('gives each channel its own level', async () => {
    await expect.poll(() => liveFigure(page, 'Level', 'left'), { timeout: 20_000 }).toBeCloseTo(-6, 1);
    expect(await liveFigure(page, 'Level', 'right')).toBeCloseTo(-12, 1);
  });

  it('counts damaged blocks and leaves them out', async () => {
    const analysis = page.locator('.bl-station').filter({ hasText: 'analysis' });
    await analysis.getByText(/no gaps/).waitFor();
    for (let count = 1; count <= 3; count += 1) {
      await page.evaluate('window.damage = 1');
      await analysis.getByText(new RegExp(`${count} damaged block`)).waitFor();
    }
    await expect.poll(() => liveFigure(page, 'Level', 'left'), { timeout: 20_000 }).toBeCloseTo(-6, 1);
  });

  it('says so when it is muted or unplugged, and opens again', async () => {
    await page.evaluate("window.tracks[0].dispatchEvent(new Event('mute'))");
    await page.getByText('muted by the system').first().waitFor();
    await page.evaluate("window.tracks[0].dispatchEvent(new Event('unmute'))");
    await page.evaluate("window.tracks[0].dispatchEvent(new Event('ended'))");
    await page
      .getByRole('alert')
      .getByText(/The input is gone/)
      .waitFor();
    await page.getByRole('button', { name: 'Open the interface' }).click();
    await page.getByRole('heading', { name: 'What is delivered' }).waitFor();
  });

  it('keeps what a take held when the input was pulled out', async () => {
    await choose(page, 'Signal', /^a take of a tone/);
    await page.getByRole('button', { name: /^Start the take/ }).click();
    // Another opening of the rig: the caution asks again.
    await confirmCaution();
    await page.getByText(/Playing and recording/).waitFor();
    await page.waitForTimeout(4000);
    await page.evaluate("window.tracks.at(-1).dispatchEvent(new Event('ended'))");
    await page.getByText('in this browser alone').waitFor({ timeout: 30_000 });
    await page
      .getByText(/The input is gone/)
      .first()
      .waitFor();
  });

  it('is refused in words where the browser may not listen', async () => {
    await page.context().clearPermissions();
    await page.addInitScript(() => {
      navigator.mediaDevices.getUserMedia = () => Promise.reject(new DOMException('no', 'NotAllowedError'));
    });
    await page.goto(`${service.url}/live`);
    await page.getByRole('button', { name: 'Open the interface' }).click();
    await page
      .getByRole('alert')
      .getByText(/may not listen to an input/)
      .waitFor();
    await page.getByRole('alert').getByRole('link', { name: 'Upload a file instead' }).waitFor();
  });
});
