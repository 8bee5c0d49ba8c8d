import { expect, test } from 'vitest';
import { escapeHtml, html } from '../../src/record/html.ts';
import { legendSvg } from '../../src/record/legendSvg.ts';
import type { Observation } from '../../src/record/observation.ts';
import { reportDocument, reportMarkup } from '../../src/record/report.ts';
import { notebookObservation, quayObservation } from './sample.ts';

const picture = { url: 'data:image/png;base64,iVBORw0KGgo=', topNm: 600 };

test('texts are escaped wherever they stand, markup only comes from the template', () => {
  expect(html`<a title="${`"'><script>`}">${'a & b < c'}</a>`.text).toBe(
    '<a title="&quot;&#39;&gt;&lt;script&gt;">a &amp; b &lt; c</a>',
  );
  expect(html`${null}${false}${undefined}${[html`<b>${1}</b>`, html`<i></i>`]}`.text).toBe('<b>1</b><i></i>');
  expect(escapeHtml('plain')).toBe('plain');
});

test('a hostile record makes no markup', () => {
  const evil = '</style></script><img src=x onerror=alert(1)>"\'';
  const poisoned = JSON.parse(
    JSON.stringify(quayObservation(), (key, value) =>
      typeof value === 'string' &&
      !['kind', 'from', 'source', 'offsetSource', 'sky', 'polariser'].includes(key)
        ? evil
        : value,
    ),
  ) as Observation;
  const page = reportDocument(poisoned, { picture });
  expect(page).not.toContain('<img src=x');
  expect(page.match(/<\/style>/g)).toHaveLength(1);
  expect(page).toContain('&lt;img src=x');
});

test('the picture comes from the record, never from a network', () => {
  for (const url of [
    'https://example.org/a.png',
    'javascript:alert(1)',
    'data:text/html;base64,aaaa',
    'blob:x" onerror="y',
  ]) {
    expect(() => reportMarkup(quayObservation(), { picture: { url, topNm: 600 } })).toThrow(RangeError);
  }
  expect(
    reportMarkup(quayObservation(), { picture: { url: 'blob:http://localhost/1-2', topNm: 600 } }).text,
  ).toContain('blob:http://localhost/1-2');
});

test('both volumes, the area, the place, the time, the hash and every caution are on the page', () => {
  const { text } = reportMarkup(quayObservation(), { picture });
  for (const part of [
    'By thickness, at least',
    'By appearance code',
    '370',
    'Coverage',
    '47 degrees 15.06 minutes north',
    '14 May 2025, 11:32 UTC',
    quayObservation().photo!.metadata.sha256,
    'Tintfathom 0.1.0, model 1',
    'The duty to report does not wait',
    'Who has been told.',
    '2 Rainbow',
  ]) {
    expect(text).toContain(part);
  }
  expect(text).not.toMatch(/undefined|null|NaN|\[object/);
});

test('a notebook has a report too', () => {
  const { text } = reportMarkup(notebookObservation());
  expect(text).toContain('Observed without a photo.');
  expect(text).not.toMatch(/undefined|null|NaN|\[object|By thickness/);
});

test('a bench is not told about spills', () => {
  const { text } = reportMarkup({ ...notebookObservation(), viewpoint: { from: 'bench' } });
  expect(text).toContain('state the set-up and the intervals');
  expect(text).not.toMatch(/benzene|duty to report/);
});

test.each([
  [75, 10],
  [600, 100],
  [1250, 200],
  [5000, 1000],
])('the legend of 0 to %d nm has even ticks and ends in its width', (topNm, stepNm) => {
  const ticks = [...legendSvg(topNm).text.matchAll(/<path d="M([\d.]+) /g)].map((m) => Number(m[1]));
  expect(ticks).toHaveLength(Math.floor(topNm / stepNm) + 1);
  expect(ticks[1]).toBeCloseTo((320 * stepNm) / topNm, 6);
  expect(ticks.at(-1)).toBeLessThanOrEqual(320);
});
