import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { decode } from 'fast-png';
import type { Download } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { chartFor } from '../../src/engine/chartFor.ts';
import type { Setup } from '../../src/engine/setup.ts';
import { scratch, tool } from '../record/tools.ts';
import { type ChartPage, openChartPage } from './chartPage.ts';

const axeSource = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');
const DIESEL: Setup = { film: 'diesel', light: { daylightK: 6500 } };
const diesel = chartFor(DIESEL, 2000);
const colourOf = (nm: number) => [...diesel.displayRgb.subarray(3 * nm, 3 * nm + 3)];

let chart: ChartPage;
beforeAll(async () => {
  chart = await openChartPage();
}, 60_000);
afterAll(() => chart?.close());

const ruler = () => chart.page.getByRole('slider', { name: 'Thickness on the colour ruler' });
const tab = (name: string) =>
  chart.page.getByRole('navigation', { name: 'Chart' }).getByRole('button', { name });
const reading = () => chart.page.getByRole('region', { name: 'Reading' });
const readsNm = async (nm: number) =>
  chart.page.waitForFunction(
    (wanted) => document.querySelector('[role=slider]')?.getAttribute('aria-valuenow') === String(wanted),
    nm,
  );

async function open(setup: Setup = DIESEL, failWith = ''): Promise<void> {
  await chart.page.setViewportSize({ width: 390, height: 844 });
  await chart.show(setup, failWith);
  if (!failWith) await ruler().waitFor();
}

async function violations(): Promise<string[]> {
  await chart.page.evaluate(axeSource);
  return chart.page.evaluate(async () => {
    const { axe } = globalThis as unknown as {
      axe: { run: (t: Document) => Promise<{ violations: { id: string; nodes: { html: string }[] }[] }> };
    };
    return (await axe.run(document)).violations.map(({ id, nodes }) => `${id}: ${nodes[0]?.html}`);
  });
}

/** Device pixels of the screen at CSS coordinates. */
async function pixelAt(x: number, y: number): Promise<number[]> {
  const { data, channels } = decode(
    await chart.page.screenshot({ clip: { x, y, width: 1, height: 1 }, scale: 'css' }),
  );
  return [...data.subarray(0, Math.min(3, channels))];
}

async function download(button: string): Promise<{ name: string; bytes: Buffer }> {
  await tab('Save').click();
  const [file]: [Download, unknown] = await Promise.all([
    chart.page.waitForEvent('download'),
    chart.page.getByRole('button', { name: button, exact: true }).click(),
  ]);
  return { name: file.suggestedFilename(), bytes: readFileSync(await file.path()) };
}

describe('reading the ruler', () => {
  it('reads a tapped colour: the thickness under the tap comes under the line', async () => {
    await open();
    await readsNm(250);
    const box = await chart.page.locator('.chart-window').boundingBox();
    if (!box) throw new Error('no ruler');
    const middle = box.y + box.height / 2;
    // 1 pixel is 1 nm: 120 pixels under the line is 120 nm thicker.
    const x = Math.round(box.x + 0.36 * box.width);
    const tapped = await pixelAt(x, Math.floor(middle + 120));
    await chart.page.mouse.click(x, middle + 120);
    // The middle of the window need not fall on a whole pixel: the tap may lie one nanometre to either side.
    await expect.poll(() => reading().textContent()).toMatch(/3(69|70|71) nm/);
    const near = [369, 370, 371].map(colourOf);
    const off = Math.min(...near.map((c) => Math.max(...c.map((v, i) => Math.abs(v - (tapped[i] ?? 0))))));
    expect(off).toBeLessThanOrEqual(1);
  });

  it('follows scrolling, keys and buttons, and stays within the chart', async () => {
    await open();
    await readsNm(250);
    await ruler().evaluate((element) => {
      element.scrollTop = 613;
    });
    await readsNm(613);
    await chart.page.getByRole('button', { name: 'Thicker by 5 nm' }).click();
    await readsNm(618);
    await ruler().focus();
    await chart.page.keyboard.press('ArrowUp');
    await readsNm(617);
    await chart.page.keyboard.press('End');
    await readsNm(2000);
    await chart.page.getByRole('button', { name: 'Thicker by 5 nm' }).click();
    await readsNm(2000);
    await ruler().press('Home');
    await readsNm(0);
    expect(await ruler().getAttribute('aria-valuetext')).toBe('0 nanometres, order 1');
  });

  it('is never pulled back while it runs under a finger', async () => {
    await open();
    await readsNm(250);
    await ruler().evaluate(async (element) => {
      for (let k = 0; k < 40; k++) {
        element.scrollTop += 7;
        // Between a frame and the next: the page has drawn the reading of a place that has moved on.
        await new Promise((resolve) => setTimeout(resolve, 11));
      }
    });
    await readsNm(250 + 40 * 7);
  });

  it('leads to a like colour of another order and back', async () => {
    await open();
    await readsNm(250);
    await reading()
      .getByRole('button', { name: /^Go to 8\d\d nm, fifth order$/ })
      .click();
    await expect.poll(() => reading().textContent()).toContain('fifth order');
    await reading()
      .getByRole('button', { name: /second order$/ })
      .waitFor();
  });

  it('jumps by a tap on the overview', async () => {
    await open();
    const box = await chart.page.locator('.chart-overview').boundingBox();
    if (!box) throw new Error('no overview');
    await chart.page.mouse.click(box.x + 20, box.y + box.height / 2);
    await expect
      .poll(async () => Math.abs(Number(await ruler().getAttribute('aria-valuenow')) - 1000))
      .toBeLessThan(5);
  });
});

describe('the set-up', () => {
  it('draws anew for another film, angle and reach, and says so', async () => {
    await open();
    await tab('Set-up').click();
    await chart.page.getByLabel('Film').selectOption('soap');
    await chart.page.getByLabel('Seen by').selectOption('phone');
    await chart.page.getByLabel('Reaches to').selectOption('1000');
    await chart.page.getByLabel(/^Looked at/).fill('45');
    await expect
      .poll(() => chart.page.evaluate(() => chartTests.asked.at(-1)))
      .toEqual({
        setup: { film: 'soap', light: { daylightK: 6500 }, camera: 'phone', incidenceDeg: 45 },
        maxThicknessNm: 1000,
      });
    await expect.poll(() => ruler().getAttribute('aria-valuemax')).toBe('1000');
    expect(await chart.page.getByRole('heading', { level: 1 }).textContent()).toBe('Soap film');
  });

  it('says what is wrong and draws when asked again', async () => {
    await open(DIESEL, 'The film has no such layer; name another.');
    await chart.page.getByRole('alert').getByText('The film has no such layer; name another.').waitFor();
    expect(await violations()).toEqual([]);
    await chart.page.evaluate(() => {
      chartTests.failWith = '';
    });
    await chart.page.getByRole('button', { name: 'Try again' }).click();
    await ruler().waitFor();
    expect(await chart.page.getByRole('alert').count()).toBe(0);
  });
});

describe('on a phone', () => {
  it('has nothing that axe finds, in both themes and every tab', async () => {
    await open();
    for (const theme of ['dark', 'sunlight']) {
      await chart.page.evaluate((name) => {
        document.documentElement.dataset.theme = name;
      }, theme);
      for (const name of ['Read', 'Set-up', 'Save']) {
        await tab(name).click();
        expect(await violations(), `${name}, ${theme}`).toEqual([]);
      }
    }
  });

  it('fits widths from 320 pixels and gives gloves 48 pixels', async () => {
    await open();
    for (const width of [320, 390, 1280]) {
      await chart.page.setViewportSize({ width, height: 720 });
      for (const name of ['Read', 'Set-up', 'Save']) {
        await tab(name).click();
        const { overflow, small } = await chart.page.evaluate(() => ({
          overflow: [document.documentElement, ...document.querySelectorAll('.chart-sheet > section')].some(
            (e) => e.scrollWidth > e.clientWidth,
          ),
          small: [...document.querySelectorAll('button, a.button, select, input')]
            .map((e) => ({ name: e.outerHTML.slice(0, 80), box: e.getBoundingClientRect() }))
            .filter(({ box }) => box.height < 48 || box.width < 48)
            .map(({ name: what }) => what),
        }));
        expect(overflow, `${name} at ${width}`).toBe(false);
        expect(small, `${name} at ${width}`).toEqual([]);
      }
    }
  });
});

describe('the sheet below the ruler', () => {
  it('keeps its height and its figures apart, whatever is read', async () => {
    await open({ film: 'soap' });
    await readsNm(250);
    for (const width of [320, 390]) {
      await chart.page.setViewportSize({ width, height: 844 });
      const heights = new Set<number>();
      for (const nm of [0, 250, 640, 1340, 1605, 2000]) {
        await ruler().evaluate((element, to) => {
          element.scrollTop = to;
        }, nm);
        await readsNm(nm);
        const { height, apart, inside } = await chart.page.evaluate(() => {
          const box = (selector: string) => document.querySelector(selector)?.getBoundingClientRect();
          const sheet = box('.chart-sheet');
          const likes = [...document.querySelectorAll('.chart-likes > *')].map((e) =>
            e.getBoundingClientRect(),
          );
          const strong = document.createRange();
          strong.selectNodeContents(document.querySelector('.chart-figure strong') as Node);
          return {
            height: sheet?.height ?? 0,
            apart: (box('.chart-figure button:last-child')?.left ?? 0) - strong.getBoundingClientRect().right,
            inside: likes.every(({ right }) => right <= (sheet?.right ?? 0)),
          };
        });
        heights.add(height);
        expect(apart, `${nm} nm at ${width}`).toBeGreaterThanOrEqual(0);
        expect(inside, `${nm} nm at ${width}`).toBe(true);
      }
      expect([...heights]).toHaveLength(1);
    }
  });
});

describe('what is taken away', () => {
  it('gives a PNG in the colours of the chart', async () => {
    await open();
    const { name, bytes } = await download('PNG');
    expect(name).toBe('chart-diesel-gas-oil-0deg.png');
    const { width, height, data, channels } = decode(bytes);
    expect([width, height]).toEqual([960, 2960]);
    // Where chartSvg.ts lays the ruler: 148 to 1480 - 84 units of 2 pixels; colours from 24 + 18 % of 432 on.
    for (const nm of [100, 330, 520, 900, 1450]) {
      const y = Math.floor(2 * (148 + ((nm + 0.5) / 2000) * (1480 - 84 - 148)));
      const seen = [...data.subarray((y * width + 300) * channels, (y * width + 300) * channels + 3)];
      // A strip is 2 nm; its neighbours may be off by as much as the chart moves in 2 nm.
      const near = [-2, -1, 0, 1, 2].map((k) => colourOf(nm + k));
      const off = Math.min(...near.map((c) => Math.max(...c.map((v, i) => Math.abs(v - (seen[i] ?? 0))))));
      expect(off, `${nm} nm`).toBeLessThanOrEqual(1);
    }
  });

  it('gives an SVG that an XML parser takes, and a table', async () => {
    const svg = await download('SVG');
    const parsed = await chart.page.evaluate((text) => {
      const xml = new DOMParser().parseFromString(text, 'image/svg+xml');
      return {
        failed: xml.querySelector('parsererror') !== null,
        title: xml.querySelector('title')?.textContent,
      };
    }, svg.bytes.toString('utf8'));
    expect(parsed).toEqual({
      failed: false,
      title: 'Colours of a thin film: Diesel, gas oil, 0 to 2000 nm',
    });
    const csv = await download('CSV');
    expect(csv.name).toBe('chart-diesel-gas-oil-0deg.csv');
    expect(csv.bytes.toString('utf8').split('\r\n')).toHaveLength(2003);
  });

  it('prints one card with its set-up, as poppler reads it, and nothing else', async () => {
    await open();
    const dir = scratch();
    try {
      const path = dir.write('card.pdf', await chart.page.pdf({ format: 'A4' }));
      expect(tool('pdfinfo', [path])).toMatch(/Pages:\s+1\n/);
      const text = tool('pdftotext', ['-layout', path, '-']);
      expect(text).toContain('On fresh water of 20 °C, 0° from the vertical');
      expect(text).toContain('Daylight of 6500 K (overcast), seen by eye (CIE 1931 observer)');
      expect(text).toMatch(/say "at least 1200 nm"/);
      expect(text).toContain('Tintfathom 0.0.0-test');
      expect(text).not.toContain('Set-up');
      const card = await chart.page
        .locator('.chart-card > svg')
        .evaluate((svg) => [svg.getAttribute('width'), svg.getAttribute('height')]);
      expect(card).toEqual(['105mm', '148mm']);
    } finally {
      dir.remove();
    }
  });
});
