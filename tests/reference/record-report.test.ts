/** The report printed to PDF by Chromium and read by poppler (pdfinfo, pdftotext), neither of which is ours. */
import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { encodeRgbPng } from '../../src/record/png.ts';
import { reportDocument } from '../../src/record/report.ts';
import { paintMap } from '../../src/record/thicknessColours.ts';
import { launchChromium } from '../browser/chromium.ts';
import { notebookObservation, quayObservation } from '../record/sample.ts';
import { scratch, tool } from '../record/tools.ts';

const files = scratch();
let browser: Browser;
beforeAll(async () => {
  browser = await launchChromium();
});
afterAll(async () => {
  await browser.close();
  files.remove();
});

function mapPicture(width: number, height: number) {
  const pixels = width * height;
  const thicknessNm = Float32Array.from({ length: pixels }, (_, i) => 550 * Math.abs(Math.sin(i / 900)));
  const status = Uint8Array.from({ length: pixels }, (_, i) => 1 + (Math.floor(i / 700) % 5));
  const map = { width, height, thicknessNm, lowNm: thicknessNm, highNm: thicknessNm, order: status, status };
  const { rgb, topNm } = paintMap(map, 600);
  const png = Buffer.from(encodeRgbPng({ width, height, rgb })).toString('base64');
  return { url: `data:image/png;base64,${png}`, topNm };
}

async function printed(name: string, page: string): Promise<string> {
  const tab = await browser.newPage();
  const asked: string[] = [];
  tab.on('request', (request) => asked.push(request.url()));
  await tab.setContent(page, { waitUntil: 'load' });
  const pdf = await tab.pdf({ preferCSSPageSize: true, printBackground: true });
  await tab.close();
  expect(asked.filter((url) => !url.startsWith('data:'))).toEqual([]);
  return files.write(name, pdf);
}

/** Without line breaks: where a line ends is not what is tested. */
const textOf = (pdf: string) => tool('pdftotext', ['-raw', pdf, '-']).replace(/\s+/g, ' ');
const pagesOf = (pdf: string) => Number(/Pages:\s+(\d+)/.exec(tool('pdfinfo', [pdf]))?.[1]);

test.each([
  ['upright', 1200, 1600],
  ['wide', 1600, 1000],
])(
  'an %s photo: one A4 page, with its figures, place, time and hash as text',
  async (name, width, height) => {
    const observation = quayObservation();
    const pdf = await printed(
      `${name}.pdf`,
      reportDocument(observation, { picture: mapPicture(width, height) }),
    );
    expect(pagesOf(pdf)).toBe(1);
    expect(tool('pdfinfo', [pdf])).toMatch(/Page size:.*A4/);
    const text = textOf(pdf);
    expect(text).toContain('Sheen at the inner quay, "north" end');
    expect(text).toContain('By thickness, at least 61 84 115 millilitres');
    expect(text).toContain('By appearance code 49 – 710 millilitres');
    expect(text).toContain('Oiled area 370 420 470 square metres');
    expect(text).toContain('14 May 2025, 11:32 UTC');
    expect(text).toContain('47 degrees 15.06 minutes north');
    // Long words may be broken.
    expect(text.replaceAll(' ', '')).toContain(observation.photo!.metadata.sha256);
    expect(text).toContain('Never sniff to find out.');
    expect(text).toContain('thickness, nm');
  },
);

test('a notebook prints too', async () => {
  const pdf = await printed('notebook.pdf', reportDocument(notebookObservation()));
  expect(pagesOf(pdf)).toBe(1);
  expect(textOf(pdf)).toContain('By appearance code 16 – 180 litres');
});
