import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { fitted, panned, recentred, toPhoto, toScreen, zoomed } from '../../src/app/stage/viewTransform.ts';

const PHOTO = { width: 1200, height: 1600 };
const STAGE = { width: 390, height: 420 };

describe('where the photo lies on the stage', () => {
  it('is whole and centred at first', () => {
    const view = fitted(PHOTO, STAGE);
    expect(view.scale).toBeCloseTo(420 / 1600, 12);
    expect(toScreen(view, 600, 800)).toEqual([195, 210]);
  });

  it('goes from screen to photo and back', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -50, max: 1300, noNaN: true }),
        fc.double({ min: 1, max: 8, noNaN: true }),
        (x, zoom) => {
          const view = zoomed(fitted(PHOTO, STAGE), zoom, 100, 200, PHOTO, STAGE);
          const [sx, sy] = toScreen(view, x, 2 * x);
          const [px, py] = toPhoto(view, sx, sy);
          expect(px).toBeCloseTo(x, 6);
          expect(py).toBeCloseTo(2 * x, 6);
        },
      ),
    );
  });

  it('keeps the place under the fingers when zooming in', () => {
    const near = zoomed(fitted(PHOTO, STAGE), 4, 195, 210, PHOTO, STAGE);
    const [before] = toPhoto(near, 180, 200);
    const [after] = toPhoto(zoomed(near, 2, 180, 200, PHOTO, STAGE), 180, 200);
    expect(after).toBeCloseTo(before, 9);
  });

  it('never leaves the stage empty, however it is panned', () => {
    fc.assert(
      fc.property(fc.integer({ min: -9000, max: 9000 }), fc.integer({ min: -9000, max: 9000 }), (dx, dy) => {
        const view = panned(zoomed(fitted(PHOTO, STAGE), 5, 0, 0, PHOTO, STAGE), dx, dy, PHOTO, STAGE);
        expect(view.x).toBeLessThanOrEqual(0);
        expect(view.x + view.scale * PHOTO.width).toBeGreaterThanOrEqual(STAGE.width - 1e-9);
        expect(view.y).toBeLessThanOrEqual(0);
        expect(view.y + view.scale * PHOTO.height).toBeGreaterThanOrEqual(STAGE.height - 1e-9);
      }),
    );
  });

  it('keeps scale and middle when the stage grows or shrinks', () => {
    const near = zoomed(fitted(PHOTO, STAGE), 6, 195, 210, PHOTO, STAGE);
    const smaller = { width: 390, height: 300 };
    const view = recentred(near, STAGE, smaller, PHOTO);
    expect(view.scale).toBe(near.scale);
    const [x, y] = toPhoto(near, 195, 210);
    const [nx, ny] = toPhoto(view, 195, 150);
    expect(nx).toBeCloseTo(x, 9);
    expect(ny).toBeCloseTo(y, 9);
  });

  it('shows the whole photo again where a larger stage would leave gaps', () => {
    const larger = { width: 1200, height: 1600 };
    expect(recentred(fitted(PHOTO, STAGE), STAGE, larger, PHOTO)).toEqual(fitted(PHOTO, larger));
  });
});
