import { describe, expect, it } from 'vitest';
import { PIXEL_STATUS, type ThicknessMap } from '../../src/match/types.ts';
import { rowProfile } from '../../src/record/rowProfile.ts';

const NONE = Number.NaN;
const MAP: ThicknessMap = {
  width: 4,
  height: 3,
  thicknessNm: Float32Array.of(300, 100, NONE, 200, NONE, NONE, NONE, NONE, 0, 10, 20, 1000),
  lowNm: Float32Array.of(290, 90, NONE, 180, NONE, NONE, NONE, NONE, 0, 8, 15, 900),
  highNm: Float32Array.of(310, 110, NONE, 240, NONE, NONE, NONE, NONE, 4, 12, 30, 1100),
  order: new Uint8Array(12),
  status: new Uint8Array(12).fill(PIXEL_STATUS.measured),
};

describe('profile by row', () => {
  const lineOf = rowProfile(MAP);

  it('gives the median of what has a thickness, worked by hand', () => {
    expect(lineOf(0)).toBe('0,3,200.0,180.0,240.0');
  });

  it('takes the middle of two where their number is even', () => {
    expect(lineOf(2)).toBe('2,4,15.0,11.5,21.0');
  });

  it('leaves out a row without any', () => {
    expect(lineOf(1)).toBeNull();
  });

  it('leaves the map as it was', () => {
    expect([...MAP.thicknessNm.slice(8)]).toEqual([0, 10, 20, 1000]);
  });
});
