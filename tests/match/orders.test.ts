import { describe, expect, it } from 'vitest';
import { MOST_CANDIDATES, makeCandidateField } from '../../src/match/candidates.ts';
import { makeMapRows } from '../../src/match/mapPixels.ts';
import { mendSpeckles } from '../../src/match/mendSpeckles.ts';
import { resolveOrders } from '../../src/match/resolveOrders.ts';
import { smoothRows } from '../../src/match/smoothRows.ts';
import { PIXEL_STATUS } from '../../src/match/types.ts';

const WIDTH = 60;
const HEIGHT = 40;

/** A field whose places can be read as the truth or one order (200 nm) off, the wrong one often likelier. */
function ambiguousField(
  truth: (x: number, y: number) => number,
  wrongBonus: (x: number, y: number) => number,
) {
  const field = makeCandidateField(WIDTH, HEIGHT, 1);
  for (let y = 0; y < HEIGHT; y++) {
    for (let x = 0; x < WIDTH; x++) {
      const i = y * WIDTH + x;
      const at = i * MOST_CANDIDATES;
      field.count[i] = 3;
      [truth(x, y), truth(x, y) + 200, Math.max(0, truth(x, y) - 200)].forEach((d, k) => {
        field.thicknessNm[at + k] = d;
        field.sdNm[at + k] = 2;
        field.cost[at + k] = k === 0 ? wrongBonus(x, y) : 1.5;
      });
    }
  }
  return field;
}

const settledOf = (field: ReturnType<typeof makeCandidateField>, choice: Uint8Array, i: number) =>
  field.thicknessNm[i * MOST_CANDIDATES + choice[i]!]!;

describe('settling orders', () => {
  it('follows a ramp though every third place prefers a wrong order by itself', () => {
    const truth = (x: number) => 250 + 5 * x;
    const field = ambiguousField(truth, (x, y) => ((x + 2 * y) % 3 === 0 ? 2 : 0));
    const { choice } = resolveOrders(field);
    for (let i = 0; i < WIDTH * HEIGHT; i++)
      expect(Math.abs(settledOf(field, choice, i) - truth(i % WIDTH))).toBeLessThan(1);
  });

  it('lets a film end: a sharp edge stays where it is', () => {
    const truth = (x: number) => (x < 30 ? 0 : 480);
    const field = ambiguousField(truth, () => 0);
    const { choice } = resolveOrders(field);
    for (let i = 0; i < WIDTH * HEIGHT; i++) expect(settledOf(field, choice, i)).toBe(truth(i % WIDTH));
  });

  it('bridges places without film', () => {
    const truth = (x: number) => 300 + 2 * x;
    const field = ambiguousField(truth, (x, y) => (x > 40 && (x + y) % 4 === 0 ? 2 : 0));
    for (let y = 0; y < HEIGHT; y++) field.count[y * WIDTH + 38] = 0;
    const { choice } = resolveOrders(field);
    for (let y = 0; y < HEIGHT; y++) {
      expect(choice[y * WIDTH + 38]).toBe(255);
      expect(settledOf(field, choice, y * WIDTH + 50)).toBe(truth(50));
    }
  });

  it('is told by a trend which way a film thickens', () => {
    // Two mirror readings of the same colours: rising or falling downwards, equally likely by themselves.
    const field = makeCandidateField(WIDTH, HEIGHT, 1);
    for (let i = 0; i < WIDTH * HEIGHT; i++) {
      const y = Math.floor(i / WIDTH);
      const at = i * MOST_CANDIDATES;
      field.count[i] = 2;
      field.thicknessNm[at] = 600 - 6 * y;
      field.thicknessNm[at + 1] = 300 + 6 * y;
      field.sdNm.fill(2, at, at + 2);
    }
    const { choice } = resolveOrders(field, { thickerDown: true });
    for (let i = 0; i < WIDTH * HEIGHT; i++)
      expect(settledOf(field, choice, i)).toBe(300 + 6 * Math.floor(i / WIDTH));
  });
});

describe('smoothing and mending', () => {
  const rowsWith = (value: (x: number, y: number) => number, sd = 4) => {
    const rows = makeMapRows(WIDTH, 0, HEIGHT);
    for (let i = 0; i < WIDTH * HEIGHT; i++) {
      const d = value(i % WIDTH, Math.floor(i / WIDTH));
      rows.thicknessNm[i] = d;
      rows.lowNm[i] = d - 1.645 * sd;
      rows.highNm[i] = d + 1.645 * sd;
      rows.status[i] = PIXEL_STATUS.measured;
    }
    return rows;
  };
  let state = 1;
  const noise = () => {
    let sum = -6;
    for (let k = 0; k < 12; k++) {
      state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
      sum += state / 4294967296;
    }
    return sum;
  };

  it('leaves a slope as it is', () => {
    const rows = rowsWith((x, y) => 200 + 7 * x - 3 * y);
    smoothRows(rows, WIDTH, 2);
    for (let i = 0; i < WIDTH * HEIGHT; i++) {
      expect(rows.thicknessNm[i]!).toBeCloseTo(200 + 7 * (i % WIDTH) - 3 * Math.floor(i / WIDTH), 2);
    }
  });

  it('halves independent noise at least, and keeps an edge of 60 nm', () => {
    const truth = (x: number) => (x < 30 ? 300 : 360);
    const rows = rowsWith((x) => truth(x) + 4 * noise());
    smoothRows(rows, WIDTH, 2);
    let square = 0;
    let n = 0;
    for (let y = 2; y < HEIGHT - 2; y++) {
      for (let x = 2; x < WIDTH - 2; x++) {
        square += (rows.thicknessNm[y * WIDTH + x]! - truth(x)) ** 2;
        n++;
      }
    }
    expect(Math.sqrt(square / n)).toBeLessThan(2);
  });

  it('mends a lone pixel of a wrong order and leaves a straight edge', () => {
    const truth = (x: number) => (x < 30 ? 100 : 400);
    const rows = rowsWith(truth);
    rows.thicknessNm[20 * WIDTH + 10] = 900;
    mendSpeckles(rows, WIDTH);
    expect(rows.thicknessNm[20 * WIDTH + 10]).toBe(100);
    for (let x = 0; x < WIDTH; x++) expect(rows.thicknessNm[5 * WIDTH + x]).toBe(truth(x));
  });
});
