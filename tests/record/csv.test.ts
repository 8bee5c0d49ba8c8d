import { expect, test } from 'vitest';
import { csvField, writeCsv } from '../../src/record/csv.ts';

test('every line ends in CRLF, the last too', () => {
  expect(writeCsv(['a_m', 'b'], [[1, 'x']])).toBe('a_m,b\r\n1,x\r\n');
});

test('commas, quotes and line breaks are quoted, quotes doubled (RFC 4180, section 2, rules 6 and 7)', () => {
  expect(csvField('b,bb')).toBe('"b,bb"');
  expect(csvField('b"bb')).toBe('"b""bb"');
  expect(csvField('b\r\nbb')).toBe('"b\r\nbb"');
  expect(csvField('plain')).toBe('plain');
});

test.each(['=1+1', '+1', '-1', '@SUM(A1)', '\tx', '\rx'])('text %j is not a formula', (text) => {
  expect(csvField(text).replace('"', '')).toMatch(/^'/);
});

test('numbers keep their sign and all their digits; what is no number is empty', () => {
  expect([-5, 0.1 + 0.2, 1e-7, Number.NaN, Infinity, null].map(csvField)).toEqual([
    '-5',
    '0.30000000000000004',
    '1e-7',
    '',
    '',
    '',
  ]);
});

test('rows of another length are refused', () => {
  expect(() => writeCsv(['a', 'b'], [[1, 2], [3]])).toThrow('Row 2 has 1 fields, the header 2.');
});
