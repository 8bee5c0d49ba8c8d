import type { Browser, BrowserContext, Locator, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Setup } from '../../src/engine/setup.ts';
import { type BuiltApp, serveBuiltApp } from './builtApp.ts';
import { launchChromium } from './chromium.ts';
import { onWater, PHOTO, trueView, truthIn } from './harbourTruth.ts';
import { misplaced, smallControls, violations } from './page.ts';

/** One stroke over the near water, from the boom to the lower edge. */
const WATER = [
  [1150, 700],
  [560, 700],
  [540, 900],
  [1150, 900],
  [1150, 1100],
  [500, 1100],
  [470, 1300],
  [1150, 1300],
  [1150, 1500],
  [430, 1500],
] as const;

/** The figure to reach (issue 4): from opening the photo to a finished record. */
const MOST_TAPS = 12;

let app: BuiltApp;
let browser: Browser;
let context: BrowserContext;
let page: Page;
const complaints: string[] = [];

beforeAll(async () => {
  app = await serveBuiltApp();
  browser = await launchChromium();
  context = await browser.newContext({ viewport: { width: 390, height: 844 }, hasTouch: true });
  page = await context.newPage();
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

const button = (name: string): Locator => page.getByRole('button', { name, exact: true });
const step = (name: string): Locator =>
  page.getByRole('navigation', { name: 'Steps' }).getByRole('button', { name, exact: true });

/** Where a place of the photo lies on the screen. */
async function onScreen(x: number, y: number): Promise<readonly [number, number]> {
  const box = await page.locator('.stage canvas').first().boundingBox();
  if (!box) throw new Error('no stage');
  const scale = Math.min(box.width / PHOTO.width, box.height / PHOTO.height);
  return [
    box.x + (box.width - PHOTO.width * scale) / 2 + x * scale,
    box.y + (box.height - PHOTO.height * scale) / 2 + y * scale,
  ];
}

async function touchPhoto(x: number, y: number): Promise<void> {
  const [left, top] = await onScreen(x, y);
  await page.mouse.click(left, top);
}

/** One finger drawn over the photo without being lifted. */
async function strokePhoto(places: readonly (readonly [number, number])[]): Promise<void> {
  for (const [i, [x, y]] of places.entries()) {
    const [left, top] = await onScreen(x, y);
    await page.mouse.move(left, top, { steps: i === 0 ? 1 : 4 });
    if (i === 0) await page.mouse.down();
  }
  await page.mouse.up();
}

/** "40 m²33 to 48" -> [33, 48]. */
function interval(words: string): readonly [number, number] {
  const [, low, high] = /([\d,.]+) to ([\d,.]+)/.exec(words) ?? [];
  return [Number(low?.replaceAll(',', '')), Number(high?.replaceAll(',', ''))];
}

describe('oil on water, from a slanted photo to an amount', () => {
  let taps = 0;
  let volume: readonly [number, number] = [Number.NaN, Number.NaN];
  let codeVolume = volume;
  let area = volume;
  let volumeWords = '';
  const tap = async (what: () => Promise<unknown>) => {
    taps++;
    await what();
  };

  it('takes few taps to a finished record', async () => {
    await tap(() => page.locator('input[type=file]').first().setInputFiles('public/demo/harbour.jpg'));
    await step('Film').waitFor();
    await tap(() => button('Diesel, gas oil').click());
    await tap(() => step('Mark').click());
    await tap(() => touchPhoto(1005, 1310));
    await tap(() => button('Paint in').click());
    await tap(() => strokePhoto(WATER));
    await tap(() => step('View').click());
    await tap(() => touchPhoto(180, 112));
    // Not a tap that is needed: a first tap gone wrong is taken back alone.
    await button('Undo').click();
    await page.getByText('Tap the horizon twice').waitFor();
    await touchPhoto(180, 112);
    await tap(() => touchPhoto(1020, 100));
    await tap(() => button('Lens above the water: more').click());
    await tap(() => step('Amount').click());
    await page.locator('.amount[aria-busy="false"]').waitFor({ timeout: 120_000 });
    volume = interval((await page.locator('.volume').first().textContent()) ?? '');
    area = interval((await page.locator('.key-figures dd').first().textContent()) ?? '');
    codeVolume = interval((await page.locator('.volume').nth(1).textContent()) ?? '');
    volumeWords = (await page.locator('.methods').textContent()) ?? '';
    await tap(() => button('Save record').click());
    await page.getByText('Saved on this device').waitFor();
    expect(taps).toBeLessThanOrEqual(MOST_TAPS);
  }, 240_000);

  it('records both volumes, the area, the time in UTC, the position and the sun', async () => {
    // Figures and their units are held together by spaces that do not break.
    const words = ((await page.locator('main').textContent()) ?? '').replace(/\s/g, ' ');
    for (const part of [
      'Oiled area',
      'Volume by thickness',
      'Volume by appearance code',
      // The photo says 10:32:07 on 14 May 2025 at UTC-1, 47° 15' 3.6" N and 21° 24' 10.8" W.
      '14 May 2025, 11:32 UTC',
      '47° 15.06′ N, 21° 24.18′ W',
      '3 metres above the water',
      'sun 54 degrees high',
    ])
      expect(words).toContain(part);
    expect(await violations(page)).toEqual([]);
  });

  it('gives area and volumes that hold the truth of the part that was painted in', async () => {
    const kept = await page.evaluate(() => localStorage.getItem('tintfathom.setup'));
    const { setup } = JSON.parse(kept ?? '') as { setup: Setup };
    const { oiledM2, volumeM3, heightM } = await truthIn(setup);
    // What is typed is 3 m: at the same angles all areas, and so all volumes, go with the square of the height.
    const asTypedML = volumeM3 * 1e6 * (3 / heightM) ** 2;
    expect(volumeWords).toContain('mL');
    expect(area[0]).toBeLessThanOrEqual(oiledM2 * (3 / heightM) ** 2);
    expect(area[1]).toBeGreaterThanOrEqual(oiledM2 * (3 / heightM) ** 2);
    expect(area[1] / area[0]).toBeLessThan(1.6);
    expect(volume[0]).toBeLessThanOrEqual(asTypedML);
    expect(volume[1]).toBeGreaterThanOrEqual(asTypedML);
    expect(volume[1] / volume[0]).toBeLessThan(2);
    expect(codeVolume[0]).toBeLessThanOrEqual(asTypedML);
    expect(codeVolume[1]).toBeGreaterThanOrEqual(asTypedML);
  }, 60_000);

  it('keeps shares at 100 % and takes true colour from the observer alone', async () => {
    await page.goto(`${app.url}#/`);
    await step('Amount').waitFor();
    const shares = () =>
      page
        .locator('.shares-list output')
        .allTextContents()
        .then((all) => all.map((text) => Number(text.replace('%', ''))));
    const sum = (all: readonly number[]) => all.reduce((total, share) => total + share, 0);
    const before = await shares();
    expect(sum(before)).toBe(100);
    expect(before.slice(3)).toEqual([0, 0]);
    await button('Continuous true oil colour: more').click();
    const after = await shares();
    expect(after[4]).toBe(5);
    expect(sum(after)).toBe(100);
    await page.locator('.methods').getByText('at least').waitFor();
    await page.getByText('The observer called true oil colour').waitFor();
    await button('As the map says').click();
    expect(await shares()).toEqual(before);
  });

  it('names gallons and miles, and says for whom the code was made', async () => {
    await page.getByLabel('Volume in').selectOption({ label: 'US gallon' });
    await page.locator('.volume').getByText('US gal').first().waitFor();
    const areas = await page.getByLabel('Area in').locator('option').allTextContents();
    expect(areas).toContain('square nautical mile');
    expect(areas).toContain('square statute mile');
    await page.getByText('made for trained observers in aircraft').waitFor();
    await page.getByLabel('Volume in').selectOption('');
  });

  it('has nothing that axe finds, in both themes, and gives gloves 48 pixels', async () => {
    for (const theme of ['Sunlight theme', 'Dark theme']) {
      await button(theme).click();
      for (const name of ['Amount', 'View', 'Light']) {
        await step(name).click();
        expect(await violations(page), `${name}, ${theme}`).toEqual([]);
        expect(await smallControls(page), name).toEqual([]);
      }
    }
  }, 60_000);

  it('reads at twice the size of text and at 320 pixels', async () => {
    for (const [fontSize, width] of [
      ['200%', 390],
      ['', 320],
    ] as const) {
      await page.setViewportSize({ width, height: 844 });
      await page.evaluate((size) => {
        document.documentElement.style.fontSize = size;
      }, fontSize);
      for (const name of ['View', 'Amount']) {
        await step(name).click();
        expect(await misplaced(page), `${name}, ${fontSize} at ${width}`).toEqual([]);
        expect(await smallControls(page), name).toEqual([]);
        expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBe(width);
      }
    }
    await page.setViewportSize({ width: 390, height: 844 });
  });

  it('finds the true height from a length on the water', async () => {
    await step('View').click();
    await button('Check with a known length').click();
    const ends = [
      [560, 1400],
      [980, 1000],
    ] as const;
    for (const [x, y] of ends) await touchPhoto(x, y);
    const view = trueView();
    const [from, to] = ends.map(([x, y]) => onWater(view, x, y));
    const trueM = Math.hypot((to?.[0] ?? 0) - (from?.[0] ?? 0), (to?.[1] ?? 0) - (from?.[1] ?? 0));
    const entry = page.getByLabel('Length between the taps, in metres');
    await entry.fill(trueM.toFixed(3));
    await entry.blur();
    const words = (await button('Done').locator('xpath=../..').textContent()) ?? '';
    // 3 m was typed: by the horizon alone every length comes out too long by 3 over the true height.
    const [, off, way] = /(\d+) % (more|too long)/.exec(words) ?? [];
    expect(way).toBeDefined();
    expect(Math.abs(Number(off) - 100 * (3 / view.heightM - 1))).toBeLessThan(2);
    const use = page.getByRole('button', { name: /^Use it for the height/ });
    const [, heightM] = /([\d.]+) m/.exec((await use.textContent()) ?? '') ?? [];
    // Taps of a whole pixel of the screen, three of the photo, over 400.
    expect(Math.abs(Number(heightM) / view.heightM - 1)).toBeLessThan(0.02);
    await use.click();
    await page.getByText('Height from the known length').waitFor();
    expect(await violations(page)).toEqual([]);
    await button('Remove it').click();
    await button('Lens above the water: less').waitFor();
  });

  it('takes the tilt of the phone where that is allowed, and says what to do where it is not', async () => {
    await button('Tilt').click();
    const listen = page.getByRole('button', { name: /^Hold the phone/ });
    await page.evaluate(() => {
      const asking = DeviceOrientationEvent as unknown as { requestPermission?: () => Promise<string> };
      asking.requestPermission = async () => 'denied';
    });
    await listen.click();
    await page.getByRole('alert').getByText('Mark the horizon instead').waitFor();
    await page.evaluate(() => {
      const asking = DeviceOrientationEvent as unknown as { requestPermission?: () => Promise<string> };
      asking.requestPermission = async () => 'granted';
    });
    await listen.click();
    // A phone held upright has a beta of 90 degrees and looks level (W3C); leant forward by 30 it looks down by 30.
    for (let i = 0; i < 3; i++) {
      await page.evaluate(() => {
        dispatchEvent(new DeviceOrientationEvent('deviceorientation', { alpha: 0, beta: 60, gamma: 0 }));
      });
    }
    await page.waitForFunction(
      () =>
        document.querySelector<HTMLInputElement>('[aria-label="Tilted down from level, in degrees"]')
          ?.value === '30',
    );
    await button('Undo').click();
    await button('Undo').click();
    expect(await button('Horizon').getAttribute('aria-pressed')).toBe('true');
  });

  it('gives shares but no litres without a view, and says what is missing', async () => {
    await step('View').click();
    await button('Lens above the water: less').waitFor();
    await page.getByLabel('Lens above the water, in metres').fill('');
    await page.getByLabel('Lens above the water, in metres').blur();
    await step('Amount').click();
    await page
      .getByText('No area and no litres yet: give the height of the lens.')
      .waitFor({ timeout: 60_000 });
    expect(await page.locator('.volume').count()).toBe(0);
    expect(await page.locator('.key-figures').textContent()).toMatch(/Coverage\d+ %/);
    expect(await violations(page)).toEqual([]);
  }, 240_000);

  it('has no view and no amount for a soap film', async () => {
    await step('Film').click();
    await button('Soap film').click();
    expect(await step('View').count()).toBe(0);
    expect(await step('Amount').count()).toBe(0);
    await step('Mark').waitFor();
  });

  it('had nothing to complain about', () => {
    expect(complaints).toEqual([]);
  });
});
