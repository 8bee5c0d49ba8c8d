import { describe, expect, it } from 'vitest';
import { sharesFromMap, withObserverShares } from '../../src/tally/appearanceShares.ts';
import { oiledArea } from '../../src/tally/oiledArea.ts';
import { ambiguous, atLeast, bare, evenArea, film, glint, madeMap, outside } from './fields.ts';

describe('oiled area', () => {
  const map = madeMap(10, 10, (x, y) =>
    y === 9
      ? outside
      : x < 4
        ? film(100 + 10 * y)
        : x < 5
          ? atLeast(1200)
          : x < 8
            ? bare
            : x < 9
              ? glint
              : ambiguous(450),
  );
  const tally = oiledArea({ map, areaM2: evenArea(100, 2) });

  it('adds each pixel’s own area by what became of it', () => {
    expect(tally.regionM2).toBe(180);
    expect(tally.oiledM2).toBe(2 * 9 * 6);
    expect(tally.bareM2).toBe(2 * 9 * 3);
    expect(tally.unreadM2).toBe(2 * 9);
    expect(tally.atLeastM2).toBe(18);
    expect(tally.ambiguousM2).toBe(18);
  });

  it('coverage is the oiled share of what gave an answer, bounded by what the unread could be', () => {
    expect(tally.coverage).toBeCloseTo(6 / 9, 12);
    expect(tally.coverageLeast).toBeCloseTo(0.6, 12);
    expect(tally.coverageMost).toBeCloseTo(0.7, 12);
  });

  it('the histogram holds all film with a thickness, by area', () => {
    const { areaM2, stepNm } = tally.histogram;
    expect(areaM2.reduce((a, b) => a + b)).toBeCloseTo(tally.oiledM2 - tally.atLeastM2, 12);
    expect(areaM2[10]).toBe(8);
    expect(areaM2[45]).toBe(18);
    expect(stepNm).toBe(10);
    const thick = oiledArea({ map: madeMap(1, 1, () => film(9000)), areaM2: evenArea(1, 1) });
    expect(thick.histogram.areaM2.at(-1)).toBe(1);
  });

  it('leaves out what the view and the region leave out', () => {
    const areaM2 = evenArea(100, 2);
    areaM2.fill(Number.NaN, 0, 10);
    const region = new Uint8Array(100).fill(1);
    region.fill(0, 10, 20);
    const part = oiledArea({ map, areaM2, region });
    expect(part.excludedPixels).toBe(10);
    expect(part.regionM2).toBe(140);
  });

  it('no answer anywhere is no coverage, not 0 %', () => {
    const none = oiledArea({ map: madeMap(2, 2, () => glint), areaM2: evenArea(4, 1) });
    expect(none.coverage).toBeNaN();
    expect([none.coverageLeast, none.coverageMost]).toEqual([0, 1]);
  });

  it('refuses arrays of another size', () => {
    expect(() => oiledArea({ map, areaM2: evenArea(99, 1) })).toThrow(/10 × 10 pixels, but the areas 99/);
  });
});

describe('appearance shares', () => {
  it('follow the code’s limits: 40 nm, 300 nm, 5 µm', () => {
    const nm = [10, 39.9, 40, 299, 300, 4999, 5000, 30_000];
    const mapped = sharesFromMap({ map: madeMap(8, 1, (x) => film(nm[x]!)), areaM2: evenArea(8, 3) });
    expect(mapped.shares!.map((share) => Math.round(6 * share))).toEqual([2, 2, 2, 0, 0]);
    expect(mapped.belowM2).toBe(6);
    expect(mapped.codedM2).toBe(18);
    expect(mapped.notices.map(({ code }) => code)).toEqual(['code-below']);
  });

  it('never claims codes 4 and 5, however thick the lower bound', () => {
    const mapped = sharesFromMap({
      map: madeMap(2, 1, (x) => (x ? atLeast(90_000) : atLeast(1300))),
      areaM2: evenArea(2, 1),
    });
    expect(mapped.shares).toEqual([0, 0.5, 0.5, 0, 0]);
    expect(mapped.notices[0]!.code).toBe('code-open');
    const mirror = sharesFromMap({ map: madeMap(1, 1, () => atLeast(1300)), areaM2: evenArea(1, 1) }, 3);
    expect(mirror.shares).toEqual([0, 0, 1, 0, 0]);
  });

  it('no film thick enough has no shares', () => {
    expect(sharesFromMap({ map: madeMap(1, 1, () => film(20)), areaM2: evenArea(1, 1) }).shares).toBeNull();
  });

  it('the observer’s word stands, the rest keeps its proportions', () => {
    const shares = withObserverShares([0.6, 0.3, 0.1, 0, 0], { 4: 0.2 });
    expect(shares.map((share) => Math.round(1000 * share))).toEqual([480, 240, 80, 200, 0]);
    expect(withObserverShares([1, 0, 0, 0, 0], { 5: 1 })).toEqual([0, 0, 0, 0, 1]);
    expect(() => withObserverShares([1, 0, 0, 0, 0], { 1: 0.5 })).toThrow(/complete them to 100 %/);
    expect(() => withObserverShares([1, 0, 0, 0, 0], { 4: 0.7, 5: 0.7 })).toThrow(/no more than 100 %/);
    expect(() => withObserverShares([1, 0, 0, 0, 0], { 4: -0.1 })).toThrow(/0 % or more/);
  });
});
