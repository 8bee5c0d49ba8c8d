import fc from 'fast-check';
import { expect, test } from 'vitest';
import { encodeByteTiff, encodeFloatTiff } from '../../src/record/floatTiff.ts';
import { RasterError, readTiff } from '../../src/record/readTiff.ts';

const bits = (values: ArrayLike<number>) => [...new Uint32Array(Float32Array.from(values).buffer)];

test.each(['none', 'deflate'] as const)('%s: every float comes back bit for bit, NaN too', (compression) => {
  fc.assert(
    fc.property(
      fc.integer({ min: 1, max: 40 }),
      fc.array(fc.float(), { minLength: 1, maxLength: 400 }),
      (width, some) => {
        const height = Math.ceil(some.length / width);
        const values = new Float32Array(width * height).fill(Number.NaN);
        values.set(some);
        const back = readTiff(encodeFloatTiff({ width, height, values, compression }));
        expect([back.width, back.height]).toEqual([width, height]);
        expect(bits(back.values)).toEqual(bits(values));
      },
    ),
  );
});

test('rasters of many strips keep their rows in order', () => {
  const [width, height] = [1500, 700];
  const values = Float32Array.from({ length: width * height }, (_, i) => i);
  for (const compression of ['none', 'deflate'] as const) {
    const back = readTiff(encodeFloatTiff({ width, height, values, compression }));
    expect(Buffer.compare(Buffer.from(back.values.buffer), Buffer.from(values.buffer))).toBe(0);
  }
});

test('bytes come back, of odd sizes too', () => {
  for (const compression of ['none', 'deflate'] as const) {
    const values = Uint8Array.from([0, 1, 2, 255, 7, 9, 11, 13, 200]);
    const back = readTiff(encodeByteTiff({ width: 3, height: 3, values, compression }));
    expect(back.values).toEqual(values);
  }
});

test('a view into a larger buffer writes only its own values', () => {
  const all = Float32Array.from([9, 9, 1, 2, 3, 4, 9]);
  const back = readTiff(encodeFloatTiff({ width: 2, height: 2, values: all.subarray(2, 6) }));
  expect([...back.values]).toEqual([1, 2, 3, 4]);
});

test('sizes that do not fit are refused with the figures', () => {
  expect(() => encodeFloatTiff({ width: 3, height: 2, values: new Float32Array(5) })).toThrow(
    'A raster of 3 × 2 does not fit 5 values.',
  );
  expect(() => encodeByteTiff({ width: 0, height: 2, values: new Uint8Array() })).toThrow(RangeError);
});

test('a pixel on the ground has a size', () => {
  const geo = { system: { kind: 'local' }, westM: 0, northM: 0, pixelM: 0 } as const;
  expect(() => encodeFloatTiff({ width: 1, height: 1, values: new Float32Array(1), geo })).toThrow(
    'pixel size above 0',
  );
});

test('damaged or foreign files say so', () => {
  const file = encodeFloatTiff({
    width: 30,
    height: 30,
    values: new Float32Array(900),
    compression: 'deflate',
  });
  const cut = file.subarray(0, file.length - 40);
  const foreign = Uint8Array.from([0x4d, 0x4d, 0, 42, 0, 0, 0, 8]);
  for (const bad of [cut, foreign, new Uint8Array(), Uint8Array.from(file, (b, i) => (i < 40 ? 0 : b))]) {
    expect(() => readTiff(bad)).toThrow(RasterError);
  }
});

test('any single damaged byte either changes nothing that matters or is a RasterError', () => {
  const file = encodeFloatTiff({
    width: 8,
    height: 8,
    values: new Float32Array(64).fill(3),
    compression: 'deflate',
  });
  for (let i = 0; i < file.length; i++) {
    for (const change of [1, 128, 255]) {
      const bad = file.slice();
      bad[i] = bad[i]! ^ change;
      try {
        readTiff(bad);
      } catch (error) {
        expect(error).toBeInstanceOf(RasterError);
      }
    }
  }
});
