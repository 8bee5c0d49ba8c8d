/** Printing from the app's page, under the app's own policy, in a real browser. */
import { afterAll, beforeAll, expect, test } from 'vitest';
import { encodeRgbPng } from '../../src/record/png.ts';
import { CONTENT_SECURITY_POLICY } from '../../vite.config.ts';
import { openServedPage, type ServedPage } from '../browser/servedPage.ts';
import { quayObservation } from './sample.ts';
import { scratch, tool } from './tools.ts';

const files = scratch();
let served: ServedPage;
const complaints: string[] = [];
beforeAll(async () => {
  served = await openServedPage({
    module: '/tests/record/printInPage.ts',
    ready: 'printTests',
    packages: ['culori'],
    policy: CONTENT_SECURITY_POLICY,
  });
  served.page.on('console', (message) => complaints.push(message.text()));
  await served.page.evaluate(() => {
    const own = document.createElement('main');
    own.textContent = 'the app’s own screen';
    document.body.append(own);
  });
}, 60_000);
afterAll(async () => {
  await served?.close();
  files.remove();
});

const png = Buffer.from(
  encodeRgbPng({ width: 90, height: 120, rgb: new Uint8Array(90 * 120 * 3).fill(120) }),
);
const url = `data:image/png;base64,${png.toString('base64')}`;

test('only the report is printed, on one page; afterwards the page is as it was', async () => {
  const { page } = served;
  await page.evaluate(([o, picture]) => printTests.start(o, picture), [quayObservation(), url] as const);
  expect(await page.isVisible('.report')).toBe(false);
  // Printing ends with the browser's own `afterprint`.
  const pdf = files.write('print.pdf', await page.pdf({ preferCSSPageSize: true }));
  const text = tool('pdftotext', ['-raw', pdf, '-']);
  expect(text).toContain('Sheen at the inner quay');
  expect(text).not.toContain('own screen');
  expect(tool('pdfinfo', [pdf])).toMatch(/Pages:\s+1\n[\s\S]*A4/);
  expect(
    await page.evaluate(() => [
      document.querySelectorAll('.report').length,
      document.adoptedStyleSheets.length,
    ]),
  ).toEqual([0, 0]);
  expect(await page.isVisible('main')).toBe(true);
  expect(complaints.filter((text) => /Content Security Policy/i.test(text))).toEqual([]);
});

test('on paper it has its own style, although the policy forbids inline styles', async () => {
  const { page } = served;
  await page.evaluate(([o, picture]) => printTests.start(o, picture), [quayObservation(), url] as const);
  await page.emulateMedia({ media: 'print' });
  expect(
    await page.evaluate(() => {
      const columns = document.querySelector('.report-columns');
      return columns && getComputedStyle(columns).columnCount;
    }),
  ).toBe('2');
  await page.emulateMedia({ media: 'screen' });
  expect(complaints.filter((text) => /Content Security Policy/i.test(text))).toEqual([]);
});

test('a second report replaces one whose printing never ended', async () => {
  const { page } = served;
  for (const title of ['first', 'second']) {
    await page.evaluate(([o, picture]) => printTests.start(o, picture), [
      { ...quayObservation(), title },
      url,
    ] as const);
  }
  expect(
    await page.evaluate(() => Array.from(document.querySelectorAll('.report h1'), (h) => h.textContent)),
  ).toEqual(['second']);
});
