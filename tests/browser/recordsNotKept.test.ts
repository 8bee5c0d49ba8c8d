import { readFileSync } from 'node:fs';
import { strFromU8, unzipSync } from 'fflate';
import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type BuiltApp, serveBuiltApp } from './builtApp.ts';
import { launchChromium } from './chromium.ts';

let app: BuiltApp;
let browser: Browser;

beforeAll(async () => {
  app = await serveBuiltApp();
  browser = await launchChromium();
}, 120_000);

afterAll(async () => {
  await browser?.close();
  await app?.close();
});

describe('where the device keeps nothing', () => {
  it('says so, offers the ZIP, and loses nothing', async () => {
    const forbidden = await browser.newContext({
      viewport: { width: 390, height: 844 },
      acceptDownloads: true,
      serviceWorkers: 'block',
    });
    // A browser that has no room left for the records; in the worker, where they are kept.
    await forbidden.route('**/record.worker-*.js', async (route) => {
      const response = await route.fetch();
      const full = `IDBObjectStore.prototype.put = () => { throw new DOMException('full', 'QuotaExceededError'); };`;
      await route.fulfill({ response, body: `${full}\n${await response.text()}` });
    });
    const there = await forbidden.newPage();
    await there.goto(app.url);
    await there.getByText('Draining soap film').click();
    await there
      .getByRole('navigation', { name: 'Steps' })
      .getByRole('button', { name: 'Map', exact: true })
      .click();
    await there.locator('.legend').waitFor({ timeout: 60_000 });
    await there.getByRole('button', { name: 'Save record' }).click();
    await there.getByText('There is no room left on this device').waitFor();
    await there.getByLabel('Remarks').fill('Not to be lost.');
    const [file] = await Promise.all([
      there.waitForEvent('download'),
      there.getByRole('button', { name: 'Save as ZIP' }).click(),
    ]);
    const entries = unzipSync(readFileSync(await file.path()));
    expect(strFromU8(entries['observation.json']!)).toContain('Not to be lost.');
    // The list knows it too, as long as the page is open.
    await there.getByRole('link', { name: 'All records' }).click();
    await there.getByText('Only in memory until this page closes').waitFor();
    await there.locator('.record-link').click();
    expect(await there.getByLabel('Remarks').inputValue()).toBe('Not to be lost.');
    expect(
      Buffer.from(entries['original/soap-film.jpg']!).equals(readFileSync('public/demo/soap-film.jpg')),
    ).toBe(true);
    await forbidden.close();
  });
});
