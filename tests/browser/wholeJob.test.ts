import { mkdirSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import type { Browser, BrowserContext, Page } from 'playwright-core';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { TRUTH_CODES_PER_NM } from '../../src/scene/truthPicture.ts';
import { type BuiltApp, serveBuiltApp } from './builtApp.ts';
import { launchChromium } from './chromium.ts';
import { violations } from './page.ts';

/** `npm run screenshots` keeps what the tests see, for the README and the manifest. */
const KEEP = process.env.KEEP_SCREENSHOTS === '1';

let app: BuiltApp;
let browser: Browser;
let context: BrowserContext;
let page: Page;
const requested: string[] = [];
const complaints: string[] = [];

beforeAll(async () => {
  app = await serveBuiltApp();
  browser = await launchChromium();
  context = await browser.newContext({
    viewport: { width: 390, height: 844 },
    deviceScaleFactor: 2,
    acceptDownloads: true,
  });
  page = await context.newPage();
  page.on('request', (request) => requested.push(request.url()));
  page.on('pageerror', (error) => complaints.push(error.message));
  page.on('console', (message) => {
    if (message.type() === 'error') complaints.push(message.text());
  });
  await page.goto(app.url);
}, 120_000);

afterAll(async () => {
  await browser?.close();
  await app?.close();
});

async function picture(name: string): Promise<void> {
  if (!KEEP) return;
  mkdirSync('public/screenshots', { recursive: true });
  await page.screenshot({ path: `public/screenshots/${name}.png` });
}

/**
 * Least and greatest true thickness of a demo photo about a place, nm: the truth is kept at every few pixels, and a tap
 * on the fitted photo is only so precise.
 */
async function truthAbout(path: string, x: number, y: number): Promise<readonly [number, number]> {
  const picture = sharp(path);
  const { width, height } = await picture.metadata();
  const codes = await picture.toColourspace('grey16').raw({ depth: 'ushort' }).toBuffer();
  const found: number[] = [];
  for (let dy = -1; dy <= 1; dy++) {
    for (let dx = -1; dx <= 1; dx++) {
      const at = (Math.floor(y * height) + dy) * width + Math.floor(x * width) + dx;
      found.push(codes.readUInt16LE(2 * at) / TRUTH_CODES_PER_NM);
    }
  }
  return [Math.min(...found), Math.max(...found)];
}

const step = (name: string) =>
  page.getByRole('navigation', { name: 'Steps' }).getByRole('button', { name, exact: true });

describe('the whole job in a real browser, offline', () => {
  it('states a policy that lets nothing leave the origin', async () => {
    const policy = await page.getAttribute('meta[http-equiv="Content-Security-Policy"]', 'content');
    expect(policy).toContain("default-src 'self'");
    expect(policy).toContain("connect-src 'self'");
  });

  it('keeps the first script under 60 KB gzipped', () => {
    const assets = join(app.outDir, 'assets');
    const main = readdirSync(assets).filter((name) => /^index-.*\.js$/.test(name));
    expect(main).toHaveLength(1);
    const bytes = gzipSync(readFileSync(join(assets, main[0] ?? ''))).length;
    expect(bytes).toBeLessThan(60 * 1024);
  });

  it('works from the first visit on with the network gone, reload included', async () => {
    await page.evaluate(() => navigator.serviceWorker.ready);
    await page.waitForFunction(() => navigator.serviceWorker.controller !== null);
    await context.setOffline(true);
    await page.reload();
    await page.getByText('Draining soap film').waitFor();
    expect(await violations(page)).toEqual([]);
    await picture('start');
  });

  it('opens a demo photo and marks the reference anew', async () => {
    await page.getByText('Draining soap film').click();
    await step('Mark').click();
    await page.getByRole('button', { name: 'Clear all marks' }).click();
    await page.getByRole('button', { name: 'Grey card' }).click();
    const stage = page.locator('.stage canvas').first();
    const box = await stage.boundingBox();
    if (!box) throw new Error('no stage');
    const setup = JSON.parse(readFileSync('public/demo/soap-film.setup.json', 'utf8')) as {
      references: { white: [number, number, number, number] };
    };
    const [x, y, width, height] = setup.references.white;
    // The photo of 1200 x 1600 is fitted and centred on the stage.
    const scale = Math.min(box.width / 1200, box.height / 1600);
    const left = box.x + (box.width - 1200 * scale) / 2 + x * scale;
    const top = box.y + (box.height - 1600 * scale) / 2 + y * scale;
    await page.mouse.move(left, top);
    await page.mouse.down();
    await page.mouse.move(left + width * scale, top + height * scale, { steps: 6 });
    await page.mouse.up();
    await page.getByRole('button', { name: 'Remove this mark' }).waitFor();
    expect(await violations(page)).toEqual([]);
    await picture('mark');
  });

  it('has every step free of faults that axe finds, in both themes', async () => {
    for (const theme of ['Sunlight theme', 'Dark theme']) {
      await page.getByRole('button', { name: theme }).click();
      for (const name of ['Film', 'Light', 'Mark']) {
        await step(name).click();
        expect(await violations(page), `${name}, ${theme}`).toEqual([]);
      }
    }
    await step('Film').click();
    await picture('film');
  });

  it('measures and reads a place with an interval that holds the truth', async () => {
    await step('Map').click();
    await page.locator('.legend').waitFor({ timeout: 60_000 });
    expect(await violations(page)).toEqual([]);
    const box = await page.locator('.stage canvas').first().boundingBox();
    if (!box) throw new Error('no stage');
    const scale = Math.min(box.width / 1200, box.height / 1600);
    await page.mouse.click(
      box.x + (box.width - 1200 * scale) / 2 + 470 * scale,
      box.y + (box.height - 1600 * scale) / 2 + 800 * scale,
    );
    const reading = page.getByRole('region', { name: 'Reading' });
    await reading.waitFor();
    const words = (await reading.textContent()) ?? '';
    expect(words).toMatch(/^\d[\d,]* nm/);
    expect(words).toMatch(/order/);
    const [, low, high] = /(\d[\d,]*) to (\d[\d,]*) nm/.exec(words) ?? [];
    const [least, greatest] = await truthAbout(
      'tests/scene/data/soap-film-truth.png',
      470 / 1200,
      800 / 1600,
    );
    expect(greatest - least).toBeLessThan(20);
    expect(Number(low?.replace(',', ''))).toBeLessThanOrEqual(greatest);
    expect(Number(high?.replace(',', ''))).toBeGreaterThanOrEqual(least);
    expect(await violations(page)).toEqual([]);
  });

  it('saves a record in one tap and hands over its map', async () => {
    await page.getByRole('button', { name: 'Save record' }).click();
    await page.getByText('Saved on this device').waitFor();
    expect(await violations(page)).toEqual([]);
    await page.getByRole('link', { name: 'Hand over' }).click();
    const [map] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('button', { name: 'Map PNG' }).click(),
    ]);
    expect([...readFileSync(await map.path()).subarray(0, 4)]).toEqual([0x89, 0x50, 0x4e, 0x47]);
    const [rows] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('button', { name: 'Rows CSV' }).click(),
    ]);
    expect(readFileSync(await rows.path(), 'utf8').split('\r\n').length).toBeGreaterThan(500);
    await page.getByRole('link', { name: 'Back to the record' }).click();
    await page.getByRole('link', { name: 'Photo' }).click();
  });

  it('undoes and redoes a mark', async () => {
    await step('Mark').click();
    await page.getByRole('button', { name: 'Grey card' }).click();
    await page.getByRole('button', { name: 'Remove this mark' }).click();
    await page.getByRole('button', { name: 'Undo' }).click();
    await page.getByRole('button', { name: 'Remove this mark' }).waitFor();
  });

  it('goes on after a reload with the photo and its marks', async () => {
    await page.reload();
    await page.getByRole('button', { name: /^Go on with/ }).click();
    await step('Mark').click();
    await page.getByRole('button', { name: 'Grey card' }).click();
    await page.getByRole('button', { name: 'Remove this mark' }).waitFor();
  });

  it('meets a corrupt photo with a sentence and goes on', async () => {
    await page.getByRole('button', { name: 'Back to the start' }).click();
    const whole = readFileSync('public/demo/soap-film.jpg');
    for (const [name, bytes] of [
      ['cut.jpg', whole.subarray(0, 900)],
      ['empty.jpg', Buffer.alloc(0)],
      ['text.png', Buffer.from('not a picture at all')],
    ] as const) {
      await page
        .locator('input[type=file]')
        .first()
        .setInputFiles({ name, mimeType: 'image/jpeg', buffer: Buffer.from(bytes) });
      const alert = page.getByRole('alert');
      await alert.waitFor();
      expect((await alert.textContent())?.length, name).toBeGreaterThan(20);
    }
    await page.getByText('Draining soap film').click();
    await step('Map').waitFor();
  });

  it('shows the chart and the sources', async () => {
    await page.goto(`${app.url}#/chart`);
    await page.locator('.chart:not([aria-busy="true"])').waitFor();
    expect(await violations(page)).toEqual([]);
    await picture('chart');
    await page.goto(`${app.url}#/about`);
    for (const part of ['Figures', 'Materials', 'Libraries']) {
      await page.locator('summary', { hasText: part }).click();
    }
    await page.getByText('BSD-3-Clause').first().waitFor();
    expect(await violations(page)).toEqual([]);
  });

  it.runIf(KEEP)('keeps pictures of both demo photos as they open', async () => {
    await page.goto(app.url);
    await page.getByText('Draining soap film').click();
    await step('Map').click();
    await page.locator('.legend').waitFor({ timeout: 60_000 });
    await picture('map');
    const box = await page.locator('.stage canvas').first().boundingBox();
    if (!box) throw new Error('no stage');
    await page.mouse.click(box.x + 0.4 * box.width, box.y + 0.5 * box.height);
    await page.getByRole('region', { name: 'Reading' }).waitFor();
    await picture('reading');
    await page.setViewportSize({ width: 1280, height: 800 });
    await page.screenshot({ path: 'public/screenshots/wide.png', scale: 'css' });
    await page.setViewportSize({ width: 390, height: 844 });
    await page.getByRole('button', { name: 'Back to the start' }).click();
    await page.getByText('Sheen in a harbour').click();
    await step('Map').click();
    await page.locator('.legend').waitFor({ timeout: 60_000 });
    await step('Amount').click();
    await page.locator('.volume').first().waitFor({ timeout: 30_000 });
    await picture('amount');
  });

  it('never asked anything of another origin, and nothing complained', () => {
    const origin = new URL(app.url).origin;
    const foreign = requested.filter(
      (url) => !url.startsWith(origin) && !url.startsWith('blob:') && !url.startsWith('data:'),
    );
    expect(foreign).toEqual([]);
    expect(complaints).toEqual([]);
  });
});
