/**
 * Our CSV read by Python's csv module in strict mode and by LibreOffice Calc, neither of which is ours. Format: RFC 4180;
 * formula guard: OWASP, CSV injection.
 */
import { pathToFileURL } from 'node:url';
import { afterAll, expect, test } from 'vitest';
import { resultsCsv } from '../../src/record/resultsCsv.ts';
import { quayObservation } from '../record/sample.ts';
import { scratch, tool } from '../record/tools.ts';

const files = scratch();
afterAll(files.remove);

const TITLE = '=HYPERLINK("http://example.org","Größe, 5 µm")';
const REMARKS = 'first line\r\nsecond "line", with; all\t+ signs';
const observation = { ...quayObservation(), title: TITLE, remarks: REMARKS };
const csv = files.write('results.csv', resultsCsv(observation));

test('Python reads every row as wide as the header, quotes and line breaks whole', () => {
  const rows: string[][] = JSON.parse(
    tool('python3', [
      '-c',
      'import csv, json, sys; print(json.dumps(list(csv.reader(open(sys.argv[1], newline="", encoding="utf-8"), strict=True))))',
      csv,
    ]),
  );
  expect(new Set(rows.map((row) => row.length))).toEqual(new Set([7]));
  const textOf = (quantity: string) => rows.find((row) => row[1] === quantity)?.[2];
  expect(textOf('title')).toBe(`'${TITLE}`);
  expect(textOf('remarks')).toBe(REMARKS);
  expect(textOf('longitude')).toBe('-21.403');
});

test('LibreOffice opens it: numbers as numbers, text as text, nothing as a formula', () => {
  const home = pathToFileURL(files.path('profile')).href;
  // Comma, double quote, UTF-8, from line 1; no guessing of columns.
  tool('soffice', [
    `-env:UserInstallation=${home}`,
    '--headless',
    '--infilter=CSV:44,34,76,1',
    '--convert-to',
    'fods',
    '--outdir',
    files.path('opened'),
    csv,
  ]);
  const sheet = files.read('opened/results.fods').toString('utf8');
  expect(sheet).not.toContain('table:formula');
  const rows = [...sheet.matchAll(/<table:table-row[^>]*>(.*?)<\/table:table-row>/gs)].map((row) =>
    [...(row[1] ?? '').matchAll(/<table:table-cell([^>]*?)(?:\/>|>(.*?)<\/table:table-cell>)/gs)].map(
      (cell) => ({
        number: /office:value="([^"]*)"/.exec(cell[1] ?? '')?.[1],
        text: (cell[2] ?? '').replace(/<[^>]*>/g, '').trim(),
      }),
    ),
  );
  const row = (quantity: string, unit = '') =>
    rows.find(
      (cells) => cells[1]?.text === quantity && (unit === '' || cells.some(({ text }) => text === unit)),
    );
  expect(Number(row('longitude')?.[2]?.number)).toBe(-21.403);
  expect(
    row('by_thickness', 'm3')
      ?.slice(2, 5)
      .map(({ number }) => Number(number)),
  ).toEqual([8.4e-5, 6.1e-5, 1.15e-4]);
  expect(row('title')?.[2]).toEqual({
    number: undefined,
    text: expect.stringContaining('=HYPERLINK(&quot;http://example.org&quot;,&quot;Größe, 5 µm&quot;)'),
  });
  expect(row('remarks')?.[2]?.text).toContain('second');
}, 120_000);
