import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  fallOn,
  fieldOfViewRad,
  focalPxFrom35mm,
  focalPxFromFieldOfView,
  lookThrough,
  pinholeCamera,
  resizeCamera,
} from '../../src/view/pinholeCamera.ts';

describe('pinhole camera', () => {
  it('the two readings of "35 mm equivalent" agree on a 3:2 photo and differ by 4 % on a 4:3 one', () => {
    expect(focalPxFrom35mm(26, 6000, 4000, 'longSide')).toBeCloseTo(focalPxFrom35mm(26, 6000, 4000), 9);
    const ratio = focalPxFrom35mm(26, 4000, 3000, 'longSide') / focalPxFrom35mm(26, 4000, 3000);
    expect(ratio).toBeCloseTo(Math.hypot(36, 24) / 36 / (5 / 4), 12);
    expect(ratio).toBeCloseTo(0.9615, 4);
  });

  it('turning the phone changes nothing', () => {
    expect(focalPxFrom35mm(26, 3000, 4000)).toBe(focalPxFrom35mm(26, 4000, 3000));
    expect(focalPxFrom35mm(26, 3000, 4000, 'longSide')).toBe(focalPxFrom35mm(26, 4000, 3000, 'longSide'));
  });

  it('angle of view and focal length are each other’s reverse', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.01, max: 3, noNaN: true }),
        fc.integer({ min: 1, max: 9999 }),
        (rad, span) => {
          expect(fieldOfViewRad(focalPxFromFieldOfView(rad, span), span)).toBeCloseTo(rad, 10);
        },
      ),
    );
  });

  it('every place looks along a ray that falls back on it, with barrel and pincushion distortion', () => {
    const ray = new Float64Array(3);
    fc.assert(
      fc.property(
        fc.double({ min: -0.1, max: 0.3, noNaN: true }),
        fc.double({ min: 0, max: 4000, noNaN: true }),
        fc.double({ min: 0, max: 3000, noNaN: true }),
        (radial, x, y) => {
          const camera = pinholeCamera(4000, 3000, 2900, radial);
          lookThrough(camera, x, y, ray);
          const back = fallOn(camera, ray[0]!, ray[1]!, ray[2]!)!;
          expect(Math.abs(back[0] - x)).toBeLessThan(1e-8);
          expect(Math.abs(back[1] - y)).toBeLessThan(1e-8);
        },
      ),
    );
  });

  it('a shrunk photo sees the same', () => {
    const camera = pinholeCamera(4000, 3000, 2900, -0.05);
    const small = resizeCamera(camera, 1000);
    expect([small.widthPx, small.heightPx]).toEqual([1000, 750]);
    const a = new Float64Array(3);
    const b = new Float64Array(3);
    lookThrough(camera, 400, 300, a);
    lookThrough(small, 100, 75, b);
    expect(b[0]! / b[2]!).toBeCloseTo(a[0]! / a[2]!, 12);
    expect(b[1]! / b[2]!).toBeCloseTo(a[1]! / a[2]!, 12);
  });

  it('refuses sizes and distortions that make no picture, and says what to check', () => {
    expect(() => pinholeCamera(0, 10, 10)).toThrow(/photo width/);
    expect(() => pinholeCamera(10, 10, Number.NaN)).toThrow(/focal length/);
    expect(() => pinholeCamera(4000, 3000, 2900, -0.4)).toThrow(/folds the corners/);
    expect(() => focalPxFrom35mm(0, 10, 10)).toThrow(/35 mm equivalent/);
    expect(() => focalPxFromFieldOfView(Math.PI, 10)).toThrow(/angle of view/);
    expect(fallOn(pinholeCamera(10, 10, 10), 0, 0, -1)).toBeNull();
  });
});
