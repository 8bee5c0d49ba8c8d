/** The 34 pairs of Sharma, Wu and Dalal 2005, table 1, printed to four decimals. */
import { expect, test } from 'vitest';
import { deltaE2000 } from '../../src/colour/deltaE2000.ts';
import { figure, readTable } from '../colour/readTable.ts';

const rows = readTable('colour-ciede2000-pairs.csv');

test('there are 34 pairs', () => expect(rows.length).toBe(34));

test.each(rows)('($L1, $a1, $b1) and ($L2, $a2, $b2): $difference, either way round', (row) => {
  const pair = Float64Array.from(['L1', 'a1', 'b1', 'L2', 'a2', 'b2'], (column) => figure(row, column));
  const published = figure(row, 'difference');
  expect(Math.abs(deltaE2000(pair, 0, pair, 1) - published)).toBeLessThanOrEqual(5.0e-5);
  expect(Math.abs(deltaE2000(pair, 1, pair, 0) - published)).toBeLessThanOrEqual(5.0e-5);
});
