import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { apply3, bradford, invert3, multiply3 } from '../../src/colour/matrix3.ts';
import { DISPLAY_P3, decodeSrgb, encodeSrgb, rgbEncodingFromMatrix, SRGB } from '../../src/colour/rgb.ts';

const unit = fc.double({ min: 0, max: 1, noNaN: true });

// To six decimals: the two branches that IEC 61966-2-1 prints miss each other by 1e-7.
test('encoding and decoding undo each other', () => {
  fc.assert(
    fc.property(unit, (value) => {
      expect(decodeSrgb(encodeSrgb(value))).toBeCloseTo(value, 6);
      expect(encodeSrgb(decodeSrgb(value))).toBeCloseTo(value, 6);
    }),
  );
});

test('all 256 codes survive decoding and encoding', () => {
  for (let code = 0; code < 256; code++)
    expect(Math.round(255 * encodeSrgb(decodeSrgb(code / 255)))).toBe(code);
});

test.each([SRGB, DISPLAY_P3])('$id: white is its own white, with Y = 1', ({ toXyz, whiteXyz }) => {
  apply3(toXyz, [1, 1, 1]).forEach((value, c) => {
    expect(value).toBeCloseTo(whiteXyz[c]!, 14);
  });
});

describe('an encoding from a matrix', () => {
  test('is scaled to Y = 1 and names its white', () => {
    const doubled = rgbEncodingFromMatrix(
      'doubled',
      SRGB.toXyz.map((v) => 2 * v),
      SRGB,
    );
    doubled.toXyz.forEach((value, i) => {
      expect(value).toBeCloseTo(SRGB.toXyz[i]!, 14);
    });
    doubled.whiteXyz.forEach((value, i) => {
      expect(value).toBeCloseTo(SRGB.whiteXyz[i]!, 14);
    });
    expect(doubled.encode(0.5)).toBe(SRGB.encode(0.5));
  });

  test('of a matrix without brightness, or that cannot be inverted, is refused', () => {
    expect(() => rgbEncodingFromMatrix('dark', new Float64Array(9), SRGB)).toThrow(/"dark".*no brightness/);
    expect(() => rgbEncodingFromMatrix('flat', new Float64Array(9).fill(1), SRGB)).toThrow(RangeError);
    expect(() => rgbEncodingFromMatrix('broken', new Float64Array(9).fill(Number.NaN), SRGB)).toThrow(
      RangeError,
    );
  });
});

describe('matrices', () => {
  test('an inverse times its matrix is the identity', () => {
    const product = multiply3(invert3(DISPLAY_P3.toXyz), DISPLAY_P3.toXyz);
    product.forEach((value, k) => {
      expect(value).toBeCloseTo(k % 4 === 0 ? 1 : 0, 14);
    });
  });

  test('a singular one is refused', () => {
    expect(() => invert3([1, 2, 3, 2, 4, 6, 0, 0, 1])).toThrow(RangeError);
  });

  test('Bradford there and back is nothing, and between equal whites too', () => {
    const a = SRGB.whiteXyz;
    const b = [0.9642, 1, 0.8249] as const;
    for (const product of [multiply3(bradford(b, a), bradford(a, b)), bradford(a, a)]) {
      product.forEach((value, k) => {
        expect(value).toBeCloseTo(k % 4 === 0 ? 1 : 0, 14);
      });
    }
  });
});
