import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { strFromU8, unzipSync } from 'fflate';
import type { Browser, BrowserContext, Download, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { type BuiltApp, serveBuiltApp } from './builtApp.ts';
import { launchChromium } from './chromium.ts';
import { smallControls, violations } from './page.ts';

/** The demo photo says where it was taken: digits that no file may hold once the position is left out. */
const PLACE = /(?<![\d.])(47\.25|-?21\.40|15\.06|24\.18|47°|21°)/;

// A busy machine measures slowly; nothing here is about time.
vi.setConfig({ testTimeout: 240_000 });

let app: BuiltApp;
let browser: Browser;
let context: BrowserContext;
let page: Page;
const complaints: string[] = [];

beforeAll(async () => {
  app = await serveBuiltApp();
  browser = await launchChromium();
  context = await browser.newContext({
    viewport: { width: 390, height: 844 },
    acceptDownloads: true,
    permissions: ['clipboard-read', 'clipboard-write', 'geolocation'],
    geolocation: { latitude: 10.5, longitude: -20.25, accuracy: 8 },
  });
  page = await context.newPage();
  page.setDefaultTimeout(60_000);
  page.on('pageerror', (error) => complaints.push(error.message));
  page.on('console', (message) => {
    if (message.type() === 'error') complaints.push(message.text());
  });
  await page.goto(app.url);
  await page.evaluate(() => navigator.serviceWorker.ready);
  await page.waitForFunction(() => navigator.serviceWorker.controller !== null);
  await context.setOffline(true);
}, 120_000);

afterAll(async () => {
  await browser?.close();
  await app?.close();
});

/** Faults of the screen in both themes, and controls too small for a thumb. */
async function faults(): Promise<string[]> {
  const found: string[] = [];
  for (const theme of ['Sunlight theme', 'Dark theme']) {
    await page.getByRole('button', { name: theme }).click();
    found.push(...(await violations(page)));
  }
  return [...found, ...(await smallControls(page))];
}

async function download(name: string | RegExp): Promise<{ name: string; bytes: Buffer }> {
  const [file] = await Promise.all([
    page.waitForEvent('download'),
    page.getByRole('button', { name }).click(),
  ]);
  return { name: file.suggestedFilename(), bytes: await bytesOf(file) };
}

async function bytesOf(file: Download): Promise<Buffer> {
  return readFileSync(await file.path());
}

const back = () => page.getByRole('link', { name: 'Back to the record' }).click();
const handOver = () => page.getByRole('link', { name: 'Hand over' }).click();
const fact = (name: string) => page.locator('summary', { hasText: name });
const saved = () => page.getByText('Saved on this device').waitFor();

/** What print would put on paper. */
async function printed(): Promise<string> {
  await page.evaluate(() => {
    window.print = () => {
      document.body.dataset.printed = document.querySelector('.report-print')?.textContent ?? '';
    };
  });
  await page.getByRole('button', { name: /^Report/ }).click();
  await page.waitForFunction(() => document.body.dataset.printed);
  return page.evaluate(() => {
    const text = document.body.dataset.printed ?? '';
    delete document.body.dataset.printed;
    dispatchEvent(new Event('afterprint'));
    return text;
  });
}

let zip: Buffer;
let id: string;

describe('a record, offline', () => {
  it('is saved from a measured photo by one tap, and its screen has no faults', async () => {
    await page.getByText('Sheen in a harbour').click();
    const steps = page.getByRole('navigation', { name: 'Steps' });
    await steps.getByRole('button', { name: 'View', exact: true }).click();
    await page.getByRole('button', { name: 'From above' }).click();
    await page.getByLabel('Lens above the water, in metres').fill('4');
    await steps.getByRole('button', { name: 'Map', exact: true }).click();
    await page.locator('.legend').waitFor({ timeout: 60_000 });
    await steps.getByRole('button', { name: 'Amount', exact: true }).click();
    await page.getByRole('button', { name: 'Save record' }).click();
    await saved();
    id = new URL(page.url()).hash.split('/')[2] ?? '';
    const words = await page.locator('main').textContent();
    expect(words).toMatch(/Oiled area\s*[\d.]+ to [\d.]+ square metres/);
    expect(words).toMatch(/Volume by thickness\s*(at least )?[\d.]+ to [\d.]+ (micro|milli)?litres/);
    expect(words).toContain('14 May 2025, 11:32 UTC');
    expect(words).toContain('The speed of the wind.');
    expect(await faults()).toEqual([]);
  });

  it('keeps what is typed, through a reload', async () => {
    await page.getByLabel('Title').fill('Sheen by the outer mole');
    await page.getByLabel('Remarks').fill('Smaller at noon.');
    await fact('Oil type').click();
    await page.getByLabel('What it is, if somebody knows').fill('diesel');
    await fact('Told').click();
    await page.getByRole('button', { name: 'Told now' }).click();
    await page.getByLabel('Who').fill('Harbour watch');
    await fact('Wind, sea, sky').click();
    await page.getByLabel('Wind, m/s').fill('3,5');
    await page.getByLabel('Wind from, degrees').fill('999');
    await page.getByText('Type a number from 0 to 360.').waitFor();
    await page.getByLabel('Wind from, degrees').fill('240');
    expect(await faults()).toEqual([]);
    await fact('Time').click();
    await page.getByLabel('Offset from UTC').fill('+02:00');
    await page.getByText('14 May 2025, 08:32 UTC').waitFor();
    await page.getByLabel('Offset from UTC').fill('+2');
    await page.getByText('Type the offset like +02:00').waitFor();
    await page.getByLabel('Offset from UTC').fill('-01:00');
    await page.waitForTimeout(700);
    await page.reload();
    await saved();
    expect(await page.getByLabel('Title').inputValue()).toBe('Sheen by the outer mole');
    const words = await page.locator('main').textContent();
    expect(words).toContain('wind 3.5 metres per second from 240 degrees');
    expect(words).toContain('Harbour watch');
    expect(words).not.toContain('The speed of the wind.');
    expect(words).not.toContain('Who has been told.');
  });

  it('asks what it could be, one question at a time, and keeps the answer', async () => {
    await page.getByText('not checked for look-alikes').click();
    await page.getByRole('button', { name: 'Begin' }).click();
    for (let i = 0; i < 9; i++) {
      if (i === 0) expect(await faults()).toEqual([]);
      // The fourth asks whether it closes again behind the stick.
      await page.getByRole('button', { name: i === 3 ? 'Yes' : 'Cannot tell' }).click();
    }
    await page.getByRole('heading', { name: 'Petroleum likely' }).waitFor();
    await page.locator('.low').getByRole('link', { name: 'Back to the record' }).click();
    await page.getByText(/Petroleum likely: it swirled/).waitFor();
  });

  it('is handed over as message, report and files', async () => {
    await handOver();
    expect(await faults()).toEqual([]);
    const message = await page.getByLabel('Message, to read out or send').inputValue();
    expect(message).toContain('Sheen by the outer mole.');
    expect(message).toContain('Position 47 degrees 15.06 minutes north, 21 degrees 24.18 minutes west.');
    expect(message).toMatch(/Volume by thickness .* (micro|milli)?litres/);
    await page.getByRole('button', { name: 'Copy' }).click();
    await page.getByText('Copied.').waitFor();
    expect(await page.evaluate(() => navigator.clipboard.readText())).toBe(message);
    const report = await printed();
    expect(report).toContain('47 degrees 15.06 minutes north');
    expect(report).toContain('Petroleum likely');
    expect((await download('Results CSV')).bytes.toString()).toContain('wind_speed,3.5');
    const geojson = JSON.parse((await download('GeoJSON')).bytes.toString());
    expect(geojson.features[0].geometry.coordinates.flat(3)[0]).toBeCloseTo(-21.403, 2);
    expect((await download('GeoTIFF')).bytes.subarray(0, 2).toString()).toBe('II');
  });

  it('leaves the position out of everything when told to', async () => {
    await page.getByLabel(/^Leave the position out/).check();
    await page.waitForFunction(() =>
      document.querySelector('textarea')?.value.includes('Position left out.'),
    );
    expect(await page.getByLabel('Message, to read out or send').inputValue()).not.toMatch(PLACE);
    expect(await printed()).not.toMatch(PLACE);
    for (const name of ['Results CSV', 'GeoJSON', 'Rows CSV']) {
      expect((await download(name)).bytes.toString('latin1'), name).not.toMatch(PLACE);
    }
    expect((await download('GeoTIFF')).bytes.toString('latin1')).toContain('Local ground grid');
    const entries = unzipSync((await download('ZIP of everything')).bytes);
    expect(Object.keys(entries).some((path) => path.startsWith('original/'))).toBe(false);
    const texts = Object.entries(entries).filter(([path]) => /\.(json|geojson|csv|txt|html)$/.test(path));
    expect(texts.length).toBeGreaterThanOrEqual(6);
    for (const [path, bytes] of texts) {
      // Data URLs hold any digits.
      const text = strFromU8(bytes).replace(/base64,[A-Za-z0-9+/=]+/g, '');
      expect(text, path).not.toMatch(PLACE);
      expect(text, path).not.toMatch(/"sun"|azimuth/);
    }
    expect(strFromU8(entries['exports/thickness_geo.tif']!, true)).toContain('Local ground grid');
    await page.getByLabel(/^Leave the position out/).uncheck();
  });

  it('goes away and comes back from its ZIP byte for byte', async () => {
    zip = (await download('ZIP of everything')).bytes;
    const entries = unzipSync(zip);
    const original = readFileSync('public/demo/harbour.jpg');
    expect(Buffer.from(entries['original/harbour.jpg']!).equals(original)).toBe(true);
    const sums = strFromU8(entries['SHA256SUMS.txt']!).trim().split('\n');
    expect(sums.length).toBe(Object.keys(entries).length - 1);
    for (const line of sums) {
      const hash = createHash('sha256').update(entries[line.slice(66)]!).digest('hex');
      expect(hash, line.slice(66)).toBe(line.slice(0, 64));
    }
    await back();
    await page.getByRole('button', { name: 'Delete' }).click();
    await page.getByText('Nothing saved yet.').waitFor();
    await page
      .getByLabel('Import a ZIP')
      .setInputFiles({ name: 'a.zip', mimeType: 'application/zip', buffer: zip });
    await saved();
    expect(new URL(page.url()).hash).toBe(`#/records/${id}`);
    await handOver();
    const again = (await download('ZIP of everything')).bytes;
    expect(again.equals(zip)).toBe(true);
    await back();
  });

  it('comes back by Undo, is copied, and is found by its words', async () => {
    await page.getByRole('button', { name: 'Delete' }).click();
    await page.getByText('Deleted: Sheen by the outer mole').waitFor();
    expect(await page.locator('.record-link').count()).toBe(0);
    await page.getByRole('button', { name: 'Undo' }).click();
    await page.locator('.record-link').click();
    await saved();
    await page.getByRole('button', { name: 'Duplicate' }).click();
    await page.waitForFunction((old) => !location.hash.includes(old), id);
    await saved();
    await page.getByLabel('Title').fill('Foam under the bridge');
    await page.waitForTimeout(700);
    await page.getByRole('link', { name: 'All records' }).click();
    await page.locator('.record-link').nth(1).waitFor();
    expect(await faults()).toEqual([]);
    await page.getByLabel('Search').fill('bridge FOAM');
    await page.waitForFunction(() => document.querySelectorAll('.record-link').length === 1);
    expect(await page.locator('.record-link').textContent()).toContain('Foam under the bridge');
    await page.getByLabel('Search').fill('whale');
    await page.getByText('No record has these words.').waitFor();
    await page.getByLabel('Search').fill('');
  });

  it('refuses a ZIP that would overwrite what was changed here, and one that is none', async () => {
    await page.getByText('Sheen by the outer mole').click();
    await page.getByLabel('Remarks').fill('Changed since.');
    await page.waitForTimeout(700);
    await page.getByRole('link', { name: 'All records' }).click();
    const pick = page.getByLabel('Import a ZIP');
    await pick.setInputFiles({ name: 'a.zip', mimeType: 'application/zip', buffer: zip });
    await page.getByText(/is on this device already and was changed there/).waitFor();
    await pick.setInputFiles({ name: 'b.zip', mimeType: 'application/zip', buffer: Buffer.from('no zip') });
    await page.getByText('There is no observation in this file').waitFor();
    await pick.setInputFiles({ name: 'c.zip', mimeType: 'application/zip', buffer: zip.subarray(0, 5000) });
    await page.getByText('This ZIP is damaged').waitFor();
  });

  it('goes back to its photo with the set-up it was read with', async () => {
    await page.getByText('Sheen by the outer mole').click();
    await page.getByRole('button', { name: 'Photo' }).click();
    await page.getByRole('navigation', { name: 'Steps' }).waitFor();
    const kept = await page.evaluate(() => localStorage.getItem('tintfathom.setup') ?? '');
    expect(kept).toContain('"heightM":4');
    expect(kept).toContain('"clean"');
    await page.getByRole('button', { name: 'Back to the start' }).click();
  });

  it('is also made without a photo, in named miles, with the checks of what was typed', async () => {
    await page.getByRole('link', { name: 'Records' }).click();
    await page.getByRole('link', { name: 'Without a photo' }).click();
    await page.getByLabel('Lengths are in').selectOption({ label: 'nautical miles' });
    await page.getByLabel('Length', { exact: true }).fill('3');
    await page.getByLabel('Width').fill('0.5');
    await page.getByLabel('Coverage, %').fill('40');
    await page.getByLabel('Wind, m/s').fill('9');
    await page.getByLabel(/^1 Sheen/).fill('80');
    await page.getByText('The shares add to 80 %: 20 % are missing.').waitFor();
    await page.getByRole('button', { name: 'The rest is Rainbow' }).click();
    // 1.5 square nautical miles x 0.4 = 2.058 km2; 80 % at 0.04 to 0.3 um and 20 % at 0.3 to 5 um: 0.19 to 2.55 m3.
    await page.getByText('2.06 square kilometres').waitFor();
    await page.getByText('190 to 2600 litres').waitFor();
    await page.getByText('In a wind above 7 m/s').waitFor();
    expect(await faults()).toEqual([]);
    await page.getByRole('button', { name: 'Save record' }).click();
    await saved();
    await fact('Position').click();
    await page.getByRole('button', { name: 'Use this device’s position' }).click();
    await page.getByText('± 8 m').waitFor();
    await page.waitForTimeout(700);
    await handOver();
    const message = await page.getByLabel('Message, to read out or send').inputValue();
    expect(message).toContain('By eye 5556 metres long, 926 metres wide');
    expect(message).toContain('Volume by appearance code 190 to 2600 litres.');
    expect(message).toContain('Position 10 degrees 30.00 minutes north, 20 degrees 15.00 minutes west.');
  });

  it('had nothing to complain of', () => {
    expect(complaints).toEqual([]);
  });
});
