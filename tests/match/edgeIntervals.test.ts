import { describe, expect, it } from 'vitest';
import { widenAtEdges } from '../../src/match/edgeIntervals.ts';
import { makeMapRows } from '../../src/match/mapPixels.ts';
import { PIXEL_STATUS } from '../../src/match/types.ts';

const WIDTH = 20;
const rowsOf = (thicknessAt: (x: number, y: number) => number) => {
  const rows = makeMapRows(WIDTH, 0, 20);
  for (let i = 0; i < rows.status.length; i++) {
    const d = thicknessAt(i % WIDTH, Math.floor(i / WIDTH));
    rows.thicknessNm[i] = d;
    rows.lowNm[i] = d - 3;
    rows.highNm[i] = d + 3;
    rows.status[i] = Number.isNaN(d) ? PIXEL_STATUS.noFilmColour : PIXEL_STATUS.measured;
  }
  return rows;
};

describe('intervals beside an edge', () => {
  it('hold both sides within two pixels of a step, and are left alone further off', () => {
    const rows = rowsOf((x) => (x < 10 ? 400 : 150));
    widenAtEdges(rows, WIDTH);
    const at = (x: number) => 10 * WIDTH + x;
    expect([rows.lowNm[at(9)], rows.highNm[at(9)]]).toEqual([150, 403]);
    expect([rows.lowNm[at(11)], rows.highNm[at(11)]]).toEqual([147, 400]);
    expect([rows.lowNm[at(7)], rows.highNm[at(7)]]).toEqual([397, 403]);
    expect([rows.lowNm[at(12)], rows.highNm[at(12)]]).toEqual([147, 153]);
  });

  it('are left alone on a slope of 7 nm a pixel, where no colours mix beyond the slope itself', () => {
    const rows = rowsOf((x) => 100 + 7 * x);
    const before = { low: rows.lowNm.slice(), high: rows.highNm.slice() };
    widenAtEdges(rows, WIDTH);
    expect(rows.lowNm).toEqual(before.low);
    expect(rows.highNm).toEqual(before.high);
  });

  it('take nothing from pixels without a thickness, and give them none', () => {
    const rows = rowsOf((x) => (x < 10 ? 400 : Number.NaN));
    widenAtEdges(rows, WIDTH);
    for (let i = 0; i < rows.status.length; i++) {
      const isFilm = i % WIDTH < 10;
      expect(Number.isNaN(rows.lowNm[i]!)).toBe(!isFilm);
      if (isFilm) expect(rows.highNm[i]! - rows.lowNm[i]!).toBe(6);
    }
  });
});
