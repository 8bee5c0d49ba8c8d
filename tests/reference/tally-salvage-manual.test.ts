import { describe, expect, it } from 'vitest';
import { AREA_UNITS, fromUnit, inUnit, THICKNESS_UNITS, VOLUME_UNITS } from '../../src/tally/units.ts';

/**
 * US Navy Ship Salvage Manual, vol. 6 (Oil Spill Response), S0300-A6-MAN-060, 1991, section 2-5, table 2-3 and example
 * 2-1: a slick of 1 mile by 2 miles, 15 % mousse (half of it water), 25 % black oil, 60 % iridescent sheen.
 */
const FACTORS = { mousse: 885_000, black: 88_500, iridescent: 265.5 };

/** US gallons from the manual's own "gallons per square mile", carried through our units with the mile it is said to be. */
function gallons(perSquareMile: number, squareMiles: number, mile: { factor: number }): number {
  const perM2 = fromUnit(perSquareMile, VOLUME_UNITS.usGallon) / mile.factor;
  return inUnit(perM2 * squareMiles * mile.factor, VOLUME_UNITS.usGallon);
}

/** Micrometres that a number of US gallons a square mile stands for. */
function thicknessUm(perSquareMile: number, mile: { factor: number }): number {
  return inUnit(fromUnit(perSquareMile, VOLUME_UNITS.usGallon) / mile.factor, THICKNESS_UNITS.um);
}

describe('Example 2-1', () => {
  it.each([AREA_UNITS.statuteSquareMile, AREA_UNITS.nauticalSquareMile])(
    'with the manual’s factors the total is 177,319 US gallons, whatever $name it meant',
    (mile) => {
      const mousse = gallons(FACTORS.mousse, 2 * 0.15, mile) * 0.5;
      const black = gallons(FACTORS.black, 2 * 0.25, mile);
      const sheen = gallons(FACTORS.iridescent, 2 * 0.6, mile);
      expect(mousse).toBeCloseTo(132_750, 6);
      expect(black).toBeCloseTo(44_250, 6);
      expect(Math.round(sheen)).toBe(319);
      expect(Math.round(mousse + black + sheen)).toBe(177_319);
      // 671.2 m³; the lesson printed with it: 60 % of the area holds under 1 % of the oil.
      expect(fromUnit(mousse + black + sheen, VOLUME_UNITS.usGallon)).toBeCloseTo(671.2, 1);
      expect(sheen / (mousse + black + sheen)).toBeLessThan(0.01);
    },
  );

  it('the unit trap: only a square nautical mile makes 265.5 gallons the 0.3 µm of iridescence', () => {
    expect(thicknessUm(FACTORS.iridescent, AREA_UNITS.nauticalSquareMile)).toBeCloseTo(0.293, 3);
    expect(thicknessUm(FACTORS.iridescent, AREA_UNITS.statuteSquareMile)).toBeCloseTo(0.388, 3);
  });

  it('with 0.3, 100 and 1,000 µm and a named mile: 518.9 m³ statute, 687.2 m³ nautical', () => {
    const volume = (mile: { factor: number }) =>
      2 * mile.factor * (0.15 * 0.5 * 1000e-6 + 0.25 * 100e-6 + 0.6 * 0.3e-6);
    expect(volume(AREA_UNITS.statuteSquareMile)).toBeCloseTo(518.9, 1);
    expect(volume(AREA_UNITS.nauticalSquareMile)).toBeCloseTo(687.2, 1);
    expect(Math.round(inUnit(volume(AREA_UNITS.statuteSquareMile), VOLUME_UNITS.usGallon))).toBe(137_087);
    expect(Math.round(inUnit(volume(AREA_UNITS.nauticalSquareMile), VOLUME_UNITS.usGallon))).toBe(181_543);
  });
});
