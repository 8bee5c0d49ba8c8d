import { describe, expect, it } from 'vitest';
import { APPEARANCES, volumeByCode } from '../../src/tally/appearanceCode.ts';
import { SAFETY_CAUTIONS, USE_CAUTIONS } from '../../src/tally/cautions.ts';
import {
  type Answer,
  LOOK_ALIKE_QUESTIONS,
  type LookAlikeQuestionId,
  weighLookAlikes,
} from '../../src/tally/lookAlikes.ts';
import { SANITY_CHECKS, type SanityFacts, sanityChecks } from '../../src/tally/sanityChecks.ts';
import { estimateWithoutPhoto } from '../../src/tally/withoutPhoto.ts';

const codes = (facts: SanityFacts) => sanityChecks(facts).map(({ code }) => code);

describe('sanity checks', () => {
  it('say nothing where nothing is known or all is well', () => {
    expect(codes({})).toEqual([]);
    expect(
      codes({
        shares: [0.5, 0.5, 0, 0, 0],
        volumeM3: 1,
        areaM2: 1e6,
        coverage: 0.8,
        windMS: 4,
        incidenceDeg: { least: 20, most: 55 },
        polariser: 'off',
        whiteBalance: 'manual',
        clippedShare: 0.001,
        areaUnit: 'statuteSquareMile',
        volumeUnit: 'usGallon',
        sunElevationDeg: 30,
        viewpoint: 'aircraft',
      }),
    ).toEqual([]);
  });

  it.each<[string, SanityFacts]>([
    ['shares-not-100', { shares: [0.5, 0.4, 0, 0, 0] }],
    ['shares-not-100', { shares: [1.2, -0.2, 0, 0, 0] }],
    ['mean-too-thin', { volumeM3: 0.039, areaM2: 1e6 }],
    ['mean-too-thick', { volumeM3: 200, areaM2: 1e4 }],
    ['coverage-range', { coverage: 1.2 }],
    ['wind-low', { windMS: 1.9 }],
    ['wind-high', { windMS: 7.1 }],
    ['view-beyond-60', { incidenceDeg: { least: 10, most: 61 } }],
    ['view-beyond-75', { incidenceDeg: { least: 10, most: 76 } }],
    ['polariser-on', { polariser: 'on' }],
    ['white-balance-auto', { whiteBalance: 'auto' }],
    ['sky-clipped', { clippedShare: 0.05 }],
    ['which-mile', { areaUnit: 'squareMile' }],
    ['which-gallon', { volumeUnit: 'gallon' }],
    ['no-daylight', { sunElevationDeg: -1 }],
    ['code-scope', { shares: [1, 0, 0, 0, 0], viewpoint: 'shore' }],
  ])('%s', (code, facts) => {
    expect(codes(facts)).toEqual([code]);
  });

  it('the mean thickness is held against 0.04 µm times the coverage', () => {
    expect(codes({ volumeM3: 0.021, areaM2: 1e6, coverage: 0.5 })).toEqual([]);
    expect(codes({ volumeM3: 0.019, areaM2: 1e6, coverage: 0.5 })).toEqual(['mean-too-thin']);
  });

  it('winds of 2 and 7 m/s themselves pass, a marked reference excuses the white balance', () => {
    expect(codes({ windMS: 2 })).toEqual([]);
    expect(codes({ windMS: 7 })).toEqual([]);
    expect(codes({ whiteBalance: 'auto', referenceMarked: true })).toEqual([]);
  });

  it('every check has its own words', () => {
    expect(SANITY_CHECKS).toHaveLength(13);
  });
});

describe('look-alikes', () => {
  const conclude = (answers: Partial<Record<LookAlikeQuestionId, Answer>>) => weighLookAlikes(answers);

  it('plates that stay broken beside orange fluff are biogenic', () => {
    const result = conclude({ breaksIntoPlates: 'yes', plantOrRustNearby: 'yes', colourBands: 'yes' });
    expect(result.conclusion).toBe('biogenicLikely');
    expect(result.reason).toMatch(/plates that stayed apart/);
    expect(result.because[0]).toBe('breaksIntoPlates');
  });

  it('a film that closes again and leads to a drain is petroleum', () => {
    const result = conclude({ closesAgain: 'yes', sourceSeen: 'yes', colourBands: 'yes' });
    expect(result.conclusion).toBe('petroleumLikely');
    expect(result.reason).toMatch(/swirled and closed again.*leads to a possible source/);
  });

  it('nothing known, or colour alone, cannot say; both strong signs contradict each other', () => {
    expect(conclude({}).conclusion).toBe('cannotSay');
    expect(conclude({ colourBands: 'yes' }).conclusion).toBe('cannotSay');
    const both = conclude({
      breaksIntoPlates: 'yes',
      fuelSmellNoticed: 'yes',
      sourceSeen: 'yes',
      closesAgain: 'yes',
    });
    expect(both.conclusion).toBe('cannotSay');
    expect(both.reason).toMatch(/both/);
  });

  it('a shadow is not oil, and a slick that holds in a strong wind is not natural', () => {
    expect(conclude({ movesWithCloudOrLand: 'yes', colourBands: 'no' }).conclusion).toBe('biogenicLikely');
    expect(
      conclude({ spreadsUnderStrongWind: 'yes', colourBands: 'yes', breaksIntoPlates: 'no' }).conclusion,
    ).toBe('petroleumLikely');
  });

  it('a clue for petroleum never turns the answer away from it', () => {
    const rank = { biogenicLikely: 0, cannotSay: 1, petroleumLikely: 2 };
    const weak = LOOK_ALIKE_QUESTIONS.filter(({ ifYes }) => ifYes > 0 && ifYes < 2.5);
    for (const other of LOOK_ALIKE_QUESTIONS) {
      for (const answer of ['yes', 'no'] as const) {
        for (const { id } of weak) {
          if (id !== other.id) {
            const without = conclude({ [other.id]: answer }).conclusion;
            expect(rank[conclude({ [other.id]: answer, [id]: 'yes' }).conclusion]).toBeGreaterThanOrEqual(
              rank[without],
            );
          }
        }
      }
    }
  });

  it('every conclusion ends in a sentence, and doubt ends in reporting it', () => {
    for (const question of LOOK_ALIKE_QUESTIONS) {
      for (const answer of ['yes', 'no', 'unknown'] as const) {
        const { reason, conclusion } = conclude({ [question.id]: answer });
        expect(reason).toMatch(/\.$/);
        if (conclusion !== 'petroleumLikely') {
          expect(reason).toMatch(/[Rr]eport it/);
        }
      }
    }
  });
});

describe('cautions', () => {
  it('duties first, then vapour, footing and contact', () => {
    expect(SAFETY_CAUTIONS.slice(0, 4).map(({ code }) => code)).toEqual([
      'safety-duties',
      'safety-vapour',
      'safety-footing',
      'safety-no-contact',
    ]);
    expect(USE_CAUTIONS.map(({ text }) => text).join(' ')).toMatch(/indicative.*authority/);
  });
});

describe('refusals of the code’s arithmetic', () => {
  it('shares that do not add up, impossible boxes and coverages', () => {
    expect(() => volumeByCode(1, [0.5, 0.4, 0, 0, 0])).toThrow(/add to 90 %/);
    expect(() => volumeByCode(-1, [1, 0, 0, 0, 0])).toThrow(/oiled area/);
    expect(() => volumeByCode(1, [1.5, -0.5, 0, 0, 0])).toThrow(/0 % or more/);
    expect(() =>
      estimateWithoutPhoto({ lengthM: 0, widthM: 1, coverage: 1, shares: [1, 0, 0, 0, 0] }),
    ).toThrow(/length/);
    expect(() =>
      estimateWithoutPhoto({ lengthM: 1, widthM: 1, coverage: 60, shares: [1, 0, 0, 0, 0] }),
    ).toThrow(/0 and 100 %/);
  });

  it('each code begins where the one before ends', () => {
    for (let i = 1; i < 5; i++) {
      expect(APPEARANCES[i]!.minUm).toBe(APPEARANCES[i - 1]!.maxUm);
    }
  });

  it('only code 5 makes a total open-ended, and there least and most are one', () => {
    const five = volumeByCode(1e6, [0, 0, 0, 0, 1]);
    expect(five.atLeast).toBe(true);
    expect(five.minM3).toBe(five.maxM3);
    expect(volumeByCode(1e6, [0.2, 0.2, 0.2, 0.4, 0]).atLeast).toBe(false);
  });
});
