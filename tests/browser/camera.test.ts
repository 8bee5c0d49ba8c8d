/** A camera kept from one photo is used on the next; a colour target gives one too. In a real browser. */
import { mkdirSync, readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import type { Browser, Page } from 'playwright-core';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { SCENES } from '../../src/scene/catalogue.ts';
import { CONDITIONS } from '../../src/scene/conditions.ts';
import { seededRandom } from '../../src/scene/random.ts';
import { sceneCamera } from '../../src/scene/sceneCamera.ts';
import { CORNERS, targetPhoto } from '../engine/targetPhoto.ts';
import { type BuiltApp, serveBuiltApp } from './builtApp.ts';
import { launchChromium } from './chromium.ts';

const axeSource = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');
/** Where screenshots go, for those who want to look. */
const LOOK = process.env.LOOK_AT_SCREENS;

let app: BuiltApp;
let browser: Browser;
let page: Page;
const complaints: string[] = [];

const asPhoto = (codes: Uint8Array, width: number, height: number) =>
  sharp(Buffer.from(codes), { raw: { width, height, channels: 3 } })
    .withExif({ IFD0: { Make: 'Kestrel', Model: 'K-4' } })
    .jpeg({ quality: 90, chromaSubsampling: '4:2:0' })
    .toBuffer();

async function soapPhoto(seed: string, spanNm?: readonly [number, number]): Promise<Buffer> {
  const scene = SCENES['soap-draining']({
    width: 480,
    height: 360,
    seed,
    phone: 'browser',
    conditions: CONDITIONS.stated,
    ...(spanNm ? { spanNm } : {}),
  });
  return asPhoto(scene.codes, 480, 360);
}

async function open(name: string, buffer: Buffer): Promise<void> {
  await page.locator('input[type=file]').first().setInputFiles({ name, mimeType: 'image/jpeg', buffer });
  await page.getByRole('navigation', { name: 'Steps' }).waitFor();
}

const step = (name: string) =>
  page.getByRole('navigation', { name: 'Steps' }).getByRole('button', { name, exact: true });

async function look(name: string): Promise<void> {
  await page.evaluate(axeSource);
  for (const theme of ['sunlight', 'dark']) {
    await page.evaluate((value) => {
      document.documentElement.dataset.theme = value;
    }, theme);
    const found = await page.evaluate(async () => {
      const { axe } = globalThis as unknown as {
        axe: { run: (d: Document) => Promise<{ violations: { id: string; nodes: { html: string }[] }[] }> };
      };
      return (await axe.run(document)).violations.map(({ id, nodes }) => `${id}: ${nodes[0]?.html}`);
    });
    expect(found, `${name}, ${theme}`).toEqual([]);
    if (!LOOK) continue;
    mkdirSync(LOOK, { recursive: true });
    await page.screenshot({ path: `${LOOK}/${name}-${theme}.png` });
  }
}

const keptInSetup = () =>
  page.evaluate(() => {
    const kept = JSON.parse(localStorage.getItem('tintfathom.setup') ?? '{}') as {
      setup?: { camera?: { kept?: { name: string; from: string } } };
    };
    return kept.setup?.camera?.kept ?? null;
  });

beforeAll(async () => {
  app = await serveBuiltApp();
  browser = await launchChromium();
  const context = await browser.newContext({ viewport: { width: 390, height: 844 }, deviceScaleFactor: 2 });
  page = await context.newPage();
  page.on('pageerror', (error) => complaints.push(error.message));
  page.on('console', (message) => {
    if (message.type() === 'error') complaints.push(message.text());
  });
  await page.goto(app.url);
}, 300_000);

afterAll(async () => {
  await browser?.close();
  await app?.close();
});

describe('a camera kept by name', () => {
  it('is offered after a photo that determines it well, named after the phone', async () => {
    await open('first.jpg', await soapPhoto('first'));
    await step('Map').click();
    const form = page.getByRole('form', { name: 'Keep this camera' });
    await form.waitFor({ timeout: 60_000 });
    expect(await form.getByRole('textbox').inputValue()).toBe('Kestrel K-4');
    await form.scrollIntoViewIfNeeded();
    await look('keep');
    await form.getByRole('button', { name: 'Keep' }).click();
    await page.getByText('Camera kept.').waitFor();
  }, 120_000);

  it('is suggested for the next photo of the same phone, and used', async () => {
    await page.getByRole('button', { name: 'Back to the start' }).click();
    await open('next.jpg', await soapPhoto('next', [80, 250]));
    await step('Light').click();
    await page.getByRole('button', { name: /^Use “Kestrel K-4”/ }).waitFor();
    await look('suggested');
    await page.getByRole('button', { name: /^Use “Kestrel K-4”/ }).click();
    const own = page.getByRole('button', { name: /^Kestrel K-4/ });
    expect(await own.getAttribute('aria-pressed')).toBe('true');
    await own.scrollIntoViewIfNeeded();
    await look('kept-list');
    expect(await keptInSetup()).toMatchObject({ name: 'Kestrel K-4', from: 'film' });
    await step('Map').click();
    await page.getByText(/read with the kept camera “Kestrel K-4”/).waitFor({ timeout: 60_000 });
  }, 120_000);

  it('can be deleted and brought back, and survives a reload', async () => {
    await step('Light').click();
    await page.getByRole('button', { name: 'Delete Kestrel K-4' }).click();
    expect(await keptInSetup()).toBeNull();
    await page.getByRole('button', { name: /^Bring back/ }).click();
    await page.reload();
    await page.getByRole('button', { name: /^Go on with/ }).click();
    await step('Light').click();
    await page.getByRole('button', { name: /^Use “Kestrel K-4”/ }).waitFor();
  }, 60_000);
});

describe('a colour target', () => {
  it('is photographed, its corners dragged, and gives a camera that is used at once', async () => {
    const random = seededRandom('browser target');
    const pixels = await targetPhoto({
      camera: sceneCamera(
        Array.from({ length: 9 }, () => random.normal()),
        6500,
        random.fork('camera'),
      ),
      tone: { shape: 'sigmoid', strength: 0.2 },
      seed: 'browser',
      gains: [1.03, 1, 0.96],
    });
    await page.getByLabel('Open a photo of one').setInputFiles({
      name: 'target.jpg',
      mimeType: 'image/jpeg',
      buffer: await asPhoto(pixels.codes as Uint8Array, pixels.width, pixels.height),
    });
    await page.getByRole('button', { name: 'Measure the colours' }).waitFor();
    const picture = page.locator('.target-frame img');
    await page.waitForFunction(() => document.querySelectorAll('.target-frame .grip').length === 4);
    const box = await picture.boundingBox();
    if (!box) throw new Error('no picture');
    const grips = page.locator('.target-frame .grip');
    for (let k = 0; k < 4; k++) {
      const grip = await grips.nth(k).boundingBox();
      if (!grip) throw new Error('no handle');
      expect(Math.min(grip.width, grip.height)).toBeGreaterThanOrEqual(48);
      await page.mouse.move(grip.x + grip.width / 2, grip.y + grip.height / 2);
      await page.mouse.down();
      const [x, y] = CORNERS[k] ?? [0, 0];
      await page.mouse.move(
        box.x + (x / pixels.width) * box.width,
        box.y + (y / pixels.height) * box.height,
        {
          steps: 4,
        },
      );
      await page.mouse.up();
    }
    await look('target-corners');
    await page.getByRole('button', { name: 'Measure the colours' }).click();
    await page.getByText(/24 patches agree/).waitFor({ timeout: 30_000 });
    await look('target-measured');
    const name = page.getByRole('textbox', { name: 'Keep this camera as' });
    expect(await name.inputValue()).toBe('Kestrel K-4, target');
    await page.getByRole('button', { name: 'Keep', exact: true }).click();
    await step('Light').waitFor();
    expect(await keptInSetup()).toMatchObject({ name: 'Kestrel K-4, target', from: 'target' });
  }, 120_000);

  it('is refused with a sentence where the corners lie elsewhere, and the film’s photo stays open', async () => {
    await step('Light').click();
    await page
      .getByLabel('Open a photo of one')
      .setInputFiles({ name: 'film.jpg', mimeType: 'image/jpeg', buffer: await soapPhoto('first') });
    await page.getByRole('button', { name: 'Measure the colours' }).click();
    await page.getByRole('alert').waitFor();
    expect(await page.getByRole('alert').textContent()).toMatch(/24-patch target|less exposure/);
    await page.getByRole('button', { name: 'Back to the film' }).click();
    await step('Light').waitFor();
    expect(complaints).toEqual([]);
  }, 60_000);
});
