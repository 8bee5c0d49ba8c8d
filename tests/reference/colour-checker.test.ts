/** A ColorChecker chart: two published forms of its colours against each other, and its measured spectra against both. */
import { expect, test } from 'vitest';
import { applyWeights } from '../../src/colour/applyWeights.ts';
import { deltaE2000 } from '../../src/colour/deltaE2000.ts';
import { labFromXyz } from '../../src/colour/lab.ts';
import { observerWeights, whiteOf } from '../../src/colour/observer.ts';
import { FILM_WAVELENGTHS_NM } from '../../src/colour/sampled.ts';
import { chartReflectances } from '../colour/chartReflectances.ts';
import { figure, halfLastDigit, readTable } from '../colour/readTable.ts';

const published = readTable('colour-checker-lab.csv');
/** D50 as CIE 15:2004 table T.3 prints it. With the ICC's Z of 0.8249 seven of the b values would not fit. */
const CIE_D50 = [0.9642, 1, 0.8251];

test('there are 24 patches', () => expect(published.length).toBe(24));

test.each(published)('$name: published xyY gives the published CIELAB', (row) => {
  const columns = ['x', 'y', 'Y'];
  const lowest = [Infinity, Infinity, Infinity];
  const highest = [-Infinity, -Infinity, -Infinity];
  // xyY is printed to four decimals: any colour within half a unit of each may be meant.
  for (let corner = 0; corner < 8; corner++) {
    const [x, y, Y] = columns.map(
      (column, k) => figure(row, column) + (corner & (1 << k) ? 0.5e-4 : -0.5e-4),
    );
    labFromXyz([(x! / y!) * Y!, Y!, ((1 - x! - y!) / y!) * Y!], CIE_D50).forEach((value, c) => {
      lowest[c] = Math.min(lowest[c]!, value);
      highest[c] = Math.max(highest[c]!, value);
    });
  }
  ['L', 'a', 'b'].forEach((column, c) => {
    const half = halfLastDigit(row[column]!);
    expect(figure(row, column), column).toBeGreaterThanOrEqual(lowest[c]! - half);
    expect(figure(row, column), column).toBeLessThanOrEqual(highest[c]! + half);
  });
});

test('spectra of a chart, summed for D50, give its published colours as closely as its two editions agree', () => {
  const weights = observerWeights('cie1931', { illuminant: 'D50' }, FILM_WAVELENGTHS_NM);
  const lab = labFromXyz(
    applyWeights(weights, chartReflectances()),
    whiteOf('cie1931', { illuminant: 'D50' }, FILM_WAVELENGTHS_NM),
  );
  const triples = (columns: string[]) =>
    Float64Array.from(published.flatMap((row) => columns.map((column) => figure(row, column))));
  const before = triples(['L', 'a', 'b']);
  const after = triples(['later_L', 'later_a', 'later_b']);
  const editions = published.map((_, k) => deltaE2000(before, k, after, k));
  const measured = published.map((_, k) => deltaE2000(lab, k, before, k));
  expect(Math.max(...measured)).toBeLessThan(Math.max(...editions));
});
