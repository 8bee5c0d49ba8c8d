import { describe, expect, it } from 'vitest';
import { begunStroke, extendedStroke, leavesOut, painted } from '../../src/app/stage/brush.ts';
import { SRGB } from '../../src/colour/rgb.ts';
import { leftOutOf } from '../../src/engine/leftOut.ts';
import { parseSetup } from '../../src/engine/parseSetup.ts';
import type { Setup } from '../../src/engine/setup.ts';

const SETUP: Setup = { film: 'diesel' };

describe('the brush', () => {
  it('is as wide on the photo as it looks on the screen, whatever the zoom', () => {
    expect(begunStroke('out', [10, 20], 30, 0.25).widthPx).toBe(120);
    expect(begunStroke('out', [10, 20], 30, 6).widthPx).toBe(5);
    expect(begunStroke('out', [10, 20], 14, 16).widthPx).toBe(1);
  });

  it('adds a point only where the finger has moved, so that a stroke stays short', () => {
    const begun = begunStroke('in', [100, 100], 30, 0.5);
    expect(extendedStroke(begun, [104, 100], 0.5)).toBe(begun);
    expect(extendedStroke(begun, [106.04, 100], 0.5).points).toEqual([
      [100, 100],
      [106, 100],
    ]);
  });

  it('makes strokes that a set-up from outside may hold, and that the engine heeds', () => {
    const stroke = extendedStroke(begunStroke('out', [4.26, 4], 4, 1), [12, 4], 1);
    const setup = painted(painted(SETUP, begunStroke('out', [2, 12], 2, 1)), stroke);
    expect(parseSetup(JSON.parse(JSON.stringify(setup)))).toEqual(setup);
    const codes = new Uint8Array(16 * 16 * 3).fill(90);
    const out = leftOutOf({ width: 16, height: 16, codes, channels: 3, maxCode: 255, encoding: SRGB }, setup);
    expect(out[4 * 16 + 8]).toBe(1);
    expect(out[12 * 16 + 2]).toBe(1);
    expect(out[9 * 16 + 8]).toBe(0);
  });

  it('leaves nothing out where there is neither stroke nor region', () => {
    expect(leavesOut(SETUP)).toBe(false);
    expect(leavesOut({ ...SETUP, strokes: [] })).toBe(false);
    expect(leavesOut(painted(SETUP, begunStroke('in', [1, 1], 9, 1)))).toBe(true);
  });
});
