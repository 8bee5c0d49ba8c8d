import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ownShares } from '../../src/app/amountState.ts';
import { withShare } from '../../src/app/steps/AmountShares.tsx';
import { grouped, wholePercents } from '../../src/app/words/numbers.ts';
import { sunSideWords, sunWords } from '../../src/app/words/sunWords.ts';
import { APPEARANCES, type AppearanceCode, type AppearanceShares } from '../../src/tally/appearanceCode.ts';

const MAP: AppearanceShares = [0.6, 0.4, 0, 0, 0];
const sum = (shares: readonly number[]) => shares.reduce((total, share) => total + share, 0);

describe('shares that the observer gives', () => {
  it('leave the rest to the map in its proportions', () => {
    const given = withShare({}, MAP, 5, 0.05);
    const own = ownShares(MAP, given);
    expect(own?.[4]).toBe(0.05);
    expect(own?.[0]).toBeCloseTo(0.57, 12);
    expect(own?.[1]).toBeCloseTo(0.38, 12);
  });

  it('are no longer the map’s when none is given', () => {
    expect(ownShares(MAP, {})).toBeNull();
  });

  it('always make 100 %, whatever is raised or lowered, with a map or without', () => {
    const move = fc.record({
      code: fc.constantFrom<AppearanceCode>(1, 2, 3, 4, 5),
      share: fc.integer({ min: 0, max: 20 }).map((steps) => steps / 20),
    });
    const maps = fc.constantFrom<AppearanceShares | null>(null, MAP, [1, 0, 0, 0, 0], [0, 0, 1, 0, 0]);
    fc.assert(
      fc.property(maps, fc.array(move, { minLength: 1, maxLength: 12 }), (map, moves) => {
        let given = {};
        for (const { code, share } of moves) {
          given = withShare(given, map, code, share);
          const own = ownShares(map, given);
          expect(own).not.toBeNull();
          expect(sum(own ?? [])).toBeCloseTo(1, 9);
          // What was just set is what is shown.
          expect(own?.[code - 1]).toBeCloseTo(share, 9);
        }
      }),
    );
    expect(APPEARANCES).toHaveLength(5);
  });
});

describe('figures', () => {
  it('parts thousands without touching decimals', () => {
    expect(grouped('12345.6789')).toBe('12,345.6789');
    expect(grouped('999')).toBe('999');
    expect(grouped('–')).toBe('–');
  });

  it('gives whole percentages that add to 100', () => {
    expect(wholePercents([1 / 3, 1 / 3, 1 / 3])).toEqual([34, 33, 33]);
    expect(sum(wholePercents([0.005, 0.995]))).toBe(100);
  });
});

describe('where the sun stood, in words', () => {
  // 14 May, 54 degrees up in the south-east; the camera looks to 214.5 degrees, so the sun is 75 degrees to its left.
  const sun = { elevationDeg: 54, azimuthDeg: 139.5 };
  it('is told from the camera where its heading is known, else by the compass', () => {
    expect(sunWords(sun, 214.5)).toBe('Sun 54° high, to the left');
    expect(sunSideWords(sun, 184)).toBe('ahead, to the left');
    expect(sunSideWords(sun, 320)).toBe('behind you');
    expect(sunSideWords(sun, null)).toBe('in the south-east');
  });

  it('is not told at night', () => {
    expect(sunWords({ elevationDeg: -3, azimuthDeg: 0 }, 10)).toBeNull();
  });
});
