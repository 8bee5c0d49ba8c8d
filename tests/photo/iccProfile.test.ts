import fc from 'fast-check';
import { expect, test } from 'vitest';
import { SRGB } from '../../src/colour/rgb.ts';
import { toneCurve } from '../../src/photo/iccCurve.ts';
import { readIccProfile } from '../../src/photo/iccProfile.ts';
import { curve, parametric, phoneP3, profile, SRGB_CURVE, texts, xyz } from './madeProfile.ts';

const SRGB_COLUMNS = {
  // ICC "sRGB IEC61966-2.1" as circulated: D50 columns.
  rXYZ: xyz(0.43607, 0.22249, 0.01392),
  gXYZ: xyz(0.38515, 0.71687, 0.09708),
  bXYZ: xyz(0.14307, 0.06061, 0.7141),
};
const withCurve = (element: readonly number[], columns = SRGB_COLUMNS) =>
  profile('RGB ', { desc: texts({ enUS: 'Made' }), ...columns, rTRC: element, gTRC: element, bTRC: element });
const decodeOf = (element: readonly number[]) => toneCurve(Uint8Array.from(element), 0)!;

test("a phone's Display P3 profile is the exact Display P3, and its English name is read", () => {
  const reading = readIccProfile(phoneP3('P3 of a phone'));
  expect(reading).toMatchObject({ kind: 'rgb', description: 'P3 of a phone', notices: [] });
  expect(reading.encoding.id).toBe('display-p3');
});

test('sRGB columns with the sRGB curve, parametric or tabled, are the exact sRGB', () => {
  const table = Array.from({ length: 1024 }, (_, i) => Math.round(SRGB.decode(i / 1023) * 65535));
  for (const element of [SRGB_CURVE, curve(...table)])
    expect(readIccProfile(withCurve(element)).encoding).toBe(SRGB);
});

test('sRGB columns with a plain power of 2.2 are not sRGB', () => {
  const { encoding } = readIccProfile(withCurve(curve(Math.round(2.2 * 256))));
  expect(encoding.id).toBe('Made');
  expect(encoding.decode(0.5)).toBeCloseTo(0.5 ** (563 / 256), 12);
  expect(encoding.encode(encoding.decode(0.3))).toBeCloseTo(0.3, 9);
});

test('a profile that never says another white than D50 keeps D50', () => {
  const { encoding } = readIccProfile(withCurve(curve(256 * 2)));
  // The connection space white, ICC.1:2022, 7.2.16; the columns' own sum is off by their rounding.
  [0.9642, 1, 0.8249].forEach((value, index) => {
    expect(encoding.whiteXyz[index]).toBeCloseTo(value, 3);
  });
});

test('curves: identity, power, table, and the five parametric forms (ICC.1:2022, table 67)', () => {
  expect(decodeOf(curve())(0.37)).toBe(0.37);
  expect(decodeOf(curve(512))(0.5)).toBe(0.25);
  expect(decodeOf(curve(0, 13107, 65535))(0.25)).toBeCloseTo(0.1, 9);
  expect(decodeOf(curve(0, 13107, 65535))(0.75)).toBeCloseTo(0.6, 9);
  expect(decodeOf(parametric(0, 3))(0.5)).toBeCloseTo(0.125, 12);
  const one = decodeOf(parametric(1, 2, 2, -0.5));
  expect([one(0.2), one(0.5)]).toEqual([0, 0.25]);
  const two = decodeOf(parametric(2, 2, 2, -0.5, 0.125));
  expect([two(0.2), two(0.5)]).toEqual([0.125, 0.375]);
  const three = decodeOf(parametric(3, 2, 1, 0, 0.5, 0.25));
  expect([three(0.125), three(0.5)]).toEqual([0.0625, 0.25]);
  const four = decodeOf(parametric(4, 2, 1, 0, 0.5, 0.25, 0.0625, 0.03125));
  expect([four(0.125), four(0.5)]).toEqual([0.09375, 0.3125]);
});

test('grey, ink and look-up-table profiles say what they are', () => {
  const grey = readIccProfile(
    profile('GRAY', { desc: texts({ enUS: 'G' }), kTRC: curve(Math.round(1.8 * 256)) }),
  );
  expect(grey.kind).toBe('grey');
  expect(grey.encoding.decode(0.5)).toBeCloseTo(0.5 ** (461 / 256), 9);
  expect(grey.notices.join()).toMatch(/no colour/);
  expect(readIccProfile(profile('CMYK', {})).kind).toBe('cmyk');
  const tables = readIccProfile(profile('RGB ', { desc: texts({ enUS: 'L' }) }));
  expect(tables.kind).toBe('other');
  expect(tables.notices.join()).toMatch(/look-up tables/);
});

test('no damage to a profile makes the reader throw, and what it gives has a finite curve', () => {
  const whole = phoneP3();
  fc.assert(
    fc.property(
      fc.nat(whole.length),
      fc.array(fc.tuple(fc.nat(whole.length - 1), fc.nat(255)), { maxLength: 8 }),
      (length, changes) => {
        const bytes = whole.slice();
        for (const [at, value] of changes) bytes[at] = value;
        const { encoding } = readIccProfile(bytes.subarray(0, length));
        expect(Number.isFinite(encoding.decode(0.5))).toBe(true);
        expect([...encoding.toXyz].every(Number.isFinite)).toBe(true);
      },
    ),
    { numRuns: 500 },
  );
});
