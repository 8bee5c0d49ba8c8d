import type { Browser, CDPSession, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type BuiltApp, serveBuiltApp } from './builtApp.ts';
import { launchChromium } from './chromium.ts';
import { keptSetup, onScreen, smallControls, stepButton, violations } from './page.ts';

/** The harbour demo as it is shown: a place is right to within a screen pixel, about four of its own. */
const PHOTO = { width: 1200, height: 1600 };
const NEAR = 5;
type Place = readonly [number, number];

let app: BuiltApp;
let browser: Browser;
let page: Page;
let fingers: CDPSession;

beforeAll(async () => {
  app = await serveBuiltApp();
  browser = await launchChromium();
  const context = await browser.newContext({ viewport: { width: 390, height: 844 }, hasTouch: true });
  page = await context.newPage();
  fingers = await context.newCDPSession(page);
  await page.goto(app.url);
  await page.getByText('Sheen in a harbour').click();
  await stepButton(page, 'Mark').click();
}, 180_000);

afterAll(async () => {
  await browser?.close();
  await app?.close();
});

/** Fingers that go down together, move in four steps and come up again; each from and to a pixel of the photo. */
async function touch(...paths: readonly (readonly [Place, Place])[]): Promise<void> {
  const ends = await Promise.all(
    paths.map(async ([from, to]) => [
      await onScreen(page, PHOTO, ...from),
      await onScreen(page, PHOTO, ...to),
    ]),
  );
  const at = (share: number) =>
    ends.map(([a, b], id) => ({
      id,
      x: a![0] + share * (b![0] - a![0]),
      y: a![1] + share * (b![1] - a![1]),
    }));
  // One after the other, as real fingers come down.
  for (let k = 1; k <= paths.length; k++)
    await fingers.send('Input.dispatchTouchEvent', { type: 'touchStart', touchPoints: at(0).slice(0, k) });
  for (let k = 1; k <= 4; k++)
    await fingers.send('Input.dispatchTouchEvent', { type: 'touchMove', touchPoints: at(k / 4) });
  await fingers.send('Input.dispatchTouchEvent', { type: 'touchEnd', touchPoints: [] });
}

function expectNear(at: readonly number[] | undefined, x: number, y: number): void {
  expect(Math.abs((at?.[0] ?? Number.NaN) - x)).toBeLessThanOrEqual(NEAR);
  expect(Math.abs((at?.[1] ?? Number.NaN) - y)).toBeLessThanOrEqual(NEAR);
}

const button = (name: string) => page.getByRole('button', { name, exact: true });

describe('a mark in the hand', () => {
  it('is dragged by its middle, pulled by a corner, and undone', async () => {
    await button('Clean surface').click();
    const before = (await keptSetup(page)).references?.clean;
    if (!before) throw new Error('The demo has no clean surface.');
    const middle = [before[0] + before[2] / 2, before[1] + before[3] / 2] as const;
    await touch([middle, [middle[0] - 300, middle[1] + 100]]);
    const moved = (await keptSetup(page)).references?.clean ?? [0, 0, 0, 0];
    expectNear(moved, before[0] - 300, before[1] + 100);
    expect([moved[2], moved[3]]).toEqual([before[2], before[3]]);
    const corner = [moved[0] + moved[2], moved[1] + moved[3]] as const;
    await touch([corner, [corner[0] + 90, corner[1] + 60]]);
    const pulled = (await keptSetup(page)).references?.clean ?? [0, 0, 0, 0];
    expect([pulled[0], pulled[1]]).toEqual([moved[0], moved[1]]);
    expectNear([pulled[2], pulled[3]], moved[2] + 90, moved[3] + 60);
    await button('Undo').click();
    await button('Undo').click();
    expect((await keptSetup(page)).references?.clean).toEqual(before);
  });

  it('does by taps and keys what a drag does', async () => {
    const before = (await keptSetup(page)).references?.clean ?? [0, 0, 0, 0];
    for (let k = 0; k < 3; k++) await button('Move left').click();
    expect((await keptSetup(page)).references?.clean?.[0]).toBe(before[0] - 18);
    // A row of taps is one thing to undo.
    await button('Undo').click();
    await page.locator('.stage > canvas').focus();
    await page.keyboard.press('Shift+ArrowDown');
    expect((await keptSetup(page)).references?.clean?.[1]).toBe(before[1] + 10);
    await button('Undo').click();
    expect((await keptSetup(page)).references?.clean).toEqual(before);
  });

  it('is a corner of the closed region, too', async () => {
    await button('Region').click();
    const [x, y] = (await keptSetup(page)).region?.[1] ?? [0, 0];
    await touch([
      [x, y],
      [x + 60, y + 40],
    ]);
    expectNear((await keptSetup(page)).region?.[1], x + 60, y + 40);
    await button('Undo').click();
    expect((await keptSetup(page)).region?.[1]).toEqual([x, y]);
  });
});

describe('the brush', () => {
  it('paints with one finger from its first touch on, a stroke at a time', async () => {
    await button('Paint out').click();
    await button('Broad').click();
    await touch([
      [700, 1400],
      [900, 1400],
    ]);
    await button('Fine').click();
    await touch([
      [600, 1300],
      [600, 1300],
    ]);
    const [broad, fine] = (await keptSetup(page)).strokes ?? [];
    expect([broad?.paint, fine?.paint]).toEqual(['out', 'out']);
    expectNear(broad?.points[0], 700, 1400);
    expectNear(broad?.points.at(-1), 900, 1400);
    expectNear(fine?.points[0], 600, 1300);
    expect((broad?.widthPx ?? 0) / (fine?.widthPx ?? 1)).toBeCloseTo(64 / 14, 1);
    await button('Undo').click();
    expect((await keptSetup(page)).strokes).toEqual([broad]);
  });

  it('leaves two fingers to the photo: they zoom and paint nothing', async () => {
    const strokes = (await keptSetup(page)).strokes;
    const shown = await page.locator('.stage > canvas').evaluate((e) => (e as HTMLCanvasElement).toDataURL());
    await touch(
      [
        [600, 1300],
        [400, 1300],
      ],
      [
        [700, 1300],
        [900, 1300],
      ],
    );
    expect((await keptSetup(page)).strokes).toEqual(strokes);
    const zoomed = await page
      .locator('.stage > canvas')
      .evaluate((e) => (e as HTMLCanvasElement).toDataURL());
    expect(zoomed).not.toBe(shown);
    await page.locator('.stage > canvas').press('0');
  });

  it('is wiped off as a whole, and the screen is sound in both themes', async () => {
    for (const theme of ['Sunlight theme', 'Dark theme']) {
      await button(theme).click();
      expect(await violations(page), theme).toEqual([]);
      expect(await smallControls(page), theme).toEqual([]);
    }
    await button('Wipe the painting off').click();
    expect((await keptSetup(page)).strokes).toBeUndefined();
  });
});

describe('a pin after a measurement', () => {
  it('is set and dragged on the map itself, which follows while the full map is awaited', async () => {
    await stepButton(page, 'Map').click();
    await page.getByText('Tap the map to read it').waitFor({ timeout: 120_000 });
    await stepButton(page, 'Mark').click();
    await button('Pin: bare').click();
    await page.locator('.legend').waitFor();
    await touch([
      [1000, 1350],
      [1000, 1350],
    ]);
    await touch([
      [1000, 1350],
      [900, 1450],
    ]);
    const pins = (await keptSetup(page)).pins ?? [];
    expect(pins).toHaveLength(1);
    expectNear(pins[0]?.at, 900, 1450);
    await page.locator('.legend').waitFor();
    expect(await violations(page)).toEqual([]);
    await button('Undo').click();
    await button('Undo').click();
    expect((await keptSetup(page)).pins ?? []).toEqual([]);
    // Everything is as it was measured: the reading is back without another measurement.
    await stepButton(page, 'Map').click();
    await page.getByText('Tap the map to read it').waitFor({ timeout: 1000 });
  }, 180_000);

  it('may say that the film gets thicker downwards', async () => {
    await stepButton(page, 'Mark').click();
    await button('Pin: order').click();
    await page.getByRole('checkbox', { name: /thicker downwards/ }).check();
    expect((await keptSetup(page)).trend).toBe('thickerDown');
    await button('Undo').click();
    expect((await keptSetup(page)).trend).toBeUndefined();
  });
});
