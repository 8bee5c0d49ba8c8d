import { expect, test } from 'vitest';
import { type Notes, notebookObservation, reckon } from '../../src/app/records/notebook.ts';
import { readObservation } from '../../src/record/readObservation.ts';

const notes: Notes = {
  length: 1,
  width: 1,
  unit: 'nauticalMile',
  coveragePercent: 100,
  sharesPercent: [undefined, 100, undefined, undefined, undefined],
  windMS: undefined,
  from: 'aircraft',
};

test('a mile is the mile that was named (1852 m and 1609.344 m by definition)', () => {
  // Rainbow is 0.3 to 5 um: times 1852^2 m2.
  const nautical = reckon(notes).volume!;
  expect(nautical.oiledM2).toBeCloseTo(3_429_904, 3);
  expect(nautical.minM3).toBeCloseTo(1.0289712, 7);
  expect(nautical.maxM3).toBeCloseTo(17.14952, 6);
  const statute = reckon({ ...notes, unit: 'statuteMile' }).volume!;
  expect(statute.oiledM2).toBeCloseTo(2_589_988.110336, 3);
});

test('what is missing is said, and nothing is worked out without it', () => {
  for (const [change, words] of [
    [{ width: undefined }, 'Give the length and the width'],
    [{ coveragePercent: undefined }, 'Give the coverage'],
    [{ sharesPercent: [20, 30, 0, 0, 0] }, '50 % are missing'],
    [{ sharesPercent: [80, 30, 0, 0, 0] }, '10 % too much'],
    [{ sharesPercent: [undefined, undefined, undefined, undefined, undefined] }, 'Share the oil out'],
    [{ length: 0 }, 'both more than 0'],
  ] as const) {
    const { volume, missing } = reckon({ ...notes, ...change });
    expect(volume).toBeNull();
    expect(missing).toContain(words);
  }
});

test('checks speak of wind and of a view that the code was not made for; class 5 says at least', () => {
  expect(reckon({ ...notes, windMS: 1 }).notices.map(({ code }) => code)).toContain('wind-low');
  expect(reckon({ ...notes, from: 'shore' }).notices.map(({ code }) => code)).toContain('code-scope');
  expect(reckon({ ...notes, sharesPercent: [90, 0, 0, 0, 10] }).volume!.atLeast).toBe(true);
});

test('notes become a record that can be kept, half-filled ones too', () => {
  const given = { id: 'n', nowUtc: '2025-06-01T08:00:00.000Z', madeWith: { app: '1', model: '1' } };
  const whole = notebookObservation(notes, given);
  expect(readObservation(whole)).toBe(whole);
  expect(whole.slickByEye).toMatchObject({ lengthM: 1852, widthM: 1852, coverage: 1 });
  expect(whole.result?.byCode?.maxM3).toBeCloseTo(17.14952, 6);
  const half = notebookObservation({ ...notes, width: undefined, unit: 'foot' }, given);
  expect(readObservation(half)).toBe(half);
  expect(half.slickByEye).toEqual({ lengthM: 0.3048, coverage: 1 });
  expect(half.result?.byCode).toBeNull();
});
