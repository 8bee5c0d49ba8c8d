import { describe, expect, it } from 'vitest';
import {
  type Grip,
  gripAt,
  grownMark,
  hasMark,
  movedMark,
  sameMark,
  withoutMark,
} from '../../src/app/stage/grips.ts';
import type { Setup } from '../../src/engine/setup.ts';

const PHOTO = { width: 1000, height: 800 };
/** Half a screen pixel a photo pixel, photo at (10, 20) on the stage. */
const VIEW = { scale: 0.5, x: 10, y: 20 };
const SETUP: Setup = {
  film: 'diesel',
  references: { clean: [200, 300, 200, 160], white: [700, 100, 60, 60], whiteReflectance: 0.1 },
  region: [
    [0, 0],
    [999, 0],
    [999, 799],
    [0, 799],
  ],
  pins: [{ at: [500, 600], is: 'bare' }],
};

describe('what lies under a finger', () => {
  it('is a corner of the selected rectangle within 24 screen pixels', () => {
    // Right lower corner of "clean": photo (400, 460) is screen (210, 250).
    expect(gripAt(VIEW, SETUP, { kind: 'clean' }, 225, 262)).toEqual({
      mark: { kind: 'clean' },
      corner: [1, 1],
    });
    expect(gripAt(VIEW, SETUP, { kind: 'clean' }, 236, 250)).toBeNull();
  });

  it('is the whole rectangle inside, selected or not', () => {
    expect(gripAt(VIEW, SETUP, null, 160, 210)).toEqual({ mark: { kind: 'clean' }, corner: null });
    // Middle of the small card, 30 screen pixels wide: within reach of all four corners, yet it moves the card.
    expect(gripAt(VIEW, SETUP, { kind: 'white' }, 375, 85)).toEqual({
      mark: { kind: 'white' },
      corner: null,
    });
  });

  it('is a pin or a corner of the region', () => {
    expect(gripAt(VIEW, SETUP, null, 262, 318)).toEqual({ mark: { kind: 'pin', index: 0 }, corner: null });
    expect(gripAt(VIEW, SETUP, null, 12, 30)).toEqual({ mark: { kind: 'corner', index: 0 }, corner: null });
  });

  it('is nothing on open photo', () => {
    expect(gripAt(VIEW, SETUP, null, 300, 200)).toBeNull();
  });
});

describe('moving a mark', () => {
  const body: Grip = { mark: { kind: 'clean' }, corner: null };

  it('shifts a rectangle and keeps it on the photo', () => {
    expect(movedMark(SETUP, body, 10.4, -5.2, PHOTO).references?.clean).toEqual([210, 295, 200, 160]);
    expect(movedMark(SETUP, body, 5000, 5000, PHOTO).references?.clean).toEqual([800, 640, 200, 160]);
    expect(movedMark(SETUP, body, -5000, -5000, PHOTO).references?.clean).toEqual([0, 0, 200, 160]);
  });

  it('pulls one corner and leaves the opposite one', () => {
    const corner: Grip = { mark: { kind: 'clean' }, corner: [-1, 1] };
    expect(movedMark(SETUP, corner, -50, 40, PHOTO).references?.clean).toEqual([150, 300, 250, 200]);
  });

  it('never turns a rectangle inside out', () => {
    const corner: Grip = { mark: { kind: 'clean' }, corner: [-1, -1] };
    expect(movedMark(SETUP, corner, 900, 900, PHOTO).references?.clean).toEqual([392, 452, 8, 8]);
  });

  it('moves a pin and a corner of the region', () => {
    expect(movedMark(SETUP, { mark: { kind: 'pin', index: 0 }, corner: null }, 7, 9, PHOTO).pins).toEqual([
      { at: [507, 609], is: 'bare' },
    ]);
    expect(
      movedMark(SETUP, { mark: { kind: 'corner', index: 2 }, corner: null }, 50, -9, PHOTO).region?.[2],
    ).toEqual([999, 790]);
  });

  it('leaves the rest of the set-up as it was', () => {
    const { references: _, ...others } = movedMark(SETUP, body, 1, 1, PHOTO);
    const { references: __, ...before } = SETUP;
    expect(others).toEqual(before);
  });

  it('grows about the middle', () => {
    expect(grownMark(SETUP, { kind: 'clean' }, 10, PHOTO).references?.clean).toEqual([190, 290, 220, 180]);
    expect(grownMark(SETUP, { kind: 'clean' }, -10, PHOTO).references?.clean).toEqual([210, 310, 180, 140]);
  });
});

describe('taking a mark away', () => {
  it("takes the card's reflectance with the card", () => {
    expect(withoutMark(SETUP, { kind: 'white' }).references).toEqual({ clean: [200, 300, 200, 160] });
  });

  it('drops a region that would be left with two corners', () => {
    const triangle = { ...SETUP, region: SETUP.region?.slice(0, 3) ?? [] };
    expect('region' in withoutMark(triangle, { kind: 'corner', index: 0 })).toBe(false);
    expect(withoutMark(SETUP, { kind: 'corner', index: 0 }).region).toHaveLength(3);
  });

  it('is seen by hasMark', () => {
    const pin = { kind: 'pin', index: 0 } as const;
    expect(hasMark(SETUP, pin)).toBe(true);
    expect(hasMark(withoutMark(SETUP, pin), pin)).toBe(false);
  });

  it('tells marks apart by kind and index', () => {
    expect(sameMark({ kind: 'pin', index: 0 }, { kind: 'pin', index: 1 })).toBe(false);
    expect(sameMark({ kind: 'clean' }, { kind: 'clean' })).toBe(true);
    expect(sameMark(null, { kind: 'clean' })).toBe(false);
  });
});
