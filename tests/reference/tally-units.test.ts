import { describe, expect, it } from 'vitest';
import { sanityChecks } from '../../src/tally/sanityChecks.ts';
import {
  AREA_UNITS,
  filmVolumeM3,
  fromUnit,
  inUnit,
  LENGTH_UNITS,
  THICKNESS_UNITS,
  VOLUME_UNITS,
} from '../../src/tally/units.ts';

const umOver = (um: number, m2: number) => filmVolumeM3(1000 * um, m2);

describe('exact conversions', () => {
  /** NIST Handbook 44, appendix C, and Special Publication 811, appendix B. From memory; all exact. */
  it.each([
    [VOLUME_UNITS.usGallon, 3.785411784e-3],
    [VOLUME_UNITS.imperialGallon, 4.54609e-3],
    [VOLUME_UNITS.barrel, 0.158987294928],
    [AREA_UNITS.statuteSquareMile, 2_589_988.110336],
    [AREA_UNITS.nauticalSquareMile, 3_429_904],
    [AREA_UNITS.acre, 4046.8564224],
    [LENGTH_UNITS.statuteMile, 1609.344],
    [LENGTH_UNITS.nauticalMile, 1852],
  ])('1 $name', (unit, base) => {
    expect(unit.factor / base).toBeCloseTo(1, 14);
  });
});

describe('identities of the trade: common practice', () => {
  it('1 µm over 1 m², 1 ha and 1 km² is 1 mL, 10 L and 1 m³', () => {
    expect(inUnit(umOver(1, 1), VOLUME_UNITS.mL)).toBeCloseTo(1, 12);
    expect(inUnit(umOver(1, fromUnit(1, AREA_UNITS.ha)), VOLUME_UNITS.L)).toBeCloseTo(10, 12);
    expect(umOver(1, fromUnit(1, AREA_UNITS.km2))).toBeCloseTo(1, 12);
  });

  it('1 L/m² is 1 mm', () => {
    expect(inUnit(fromUnit(1, VOLUME_UNITS.L), THICKNESS_UNITS.mm)).toBeCloseTo(1, 12);
  });

  it('1 µm is 1.0691 US gallons an acre, 684.20 a square statute mile, 906.08 a square nautical mile', () => {
    const gallons = (unit: { factor: number }) => inUnit(umOver(1, unit.factor), VOLUME_UNITS.usGallon);
    expect(gallons(AREA_UNITS.acre)).toBeCloseTo(1.0691, 4);
    expect(gallons(AREA_UNITS.statuteSquareMile)).toBeCloseTo(684.2, 2);
    expect(gallons(AREA_UNITS.nauticalSquareMile)).toBeCloseTo(906.08, 2);
  });

  it('1 barrel an acre is 39.29 µm, a square statute mile 0.06139 µm', () => {
    const um = (unit: { factor: number }) =>
      inUnit(VOLUME_UNITS.barrel.factor / unit.factor, THICKNESS_UNITS.um);
    expect(um(AREA_UNITS.acre)).toBeCloseTo(39.29, 2);
    expect(um(AREA_UNITS.statuteSquareMile)).toBeCloseTo(0.06139, 5);
  });

  it('MacDonald et al. 2015 (doi 10.1002/2015JC011062): 775 km² at 0.1 µm is 77.5 m³', () => {
    expect(umOver(0.1, fromUnit(775, AREA_UNITS.km2))).toBeCloseTo(77.5, 9);
  });

  it('satellite analysts’ note, April 2010: 5,783 km² (2,233 mi²) at 1 µm is 1,527,706 US gallons, 36,374 barrels', () => {
    const areaM2 = fromUnit(5783, AREA_UNITS.km2);
    const m3 = umOver(1, areaM2);
    expect(m3).toBeCloseTo(5783, 9);
    expect(Math.round(inUnit(areaM2, AREA_UNITS.statuteSquareMile))).toBe(2233);
    expect(Math.round(inUnit(m3, VOLUME_UNITS.barrel))).toBe(36_374);
    // Exactly 1,527,706.98: they cut the decimals off.
    expect(Math.floor(inUnit(m3, VOLUME_UNITS.usGallon))).toBe(1_527_706);
    // Same note: 3 % at 100 µm and 97 % at 1 µm.
    expect(umOver(100, 0.03 * areaM2) + umOver(1, 0.97 * areaM2)).toBeCloseTo(22_958.5, 1);
  });

  it('API thickness steps from US gallons a square statute mile (25 to 1,332): 0.0365 to 1.947 µm', () => {
    const um = [25, 50, 100, 200, 666, 1332].map((gallons) =>
      inUnit(
        fromUnit(gallons, VOLUME_UNITS.usGallon) / AREA_UNITS.statuteSquareMile.factor,
        THICKNESS_UNITS.um,
      ),
    );
    [0.0365, 0.0731, 0.146, 0.292, 0.973, 1.947].forEach((expected, i) => {
      expect(um[i]).toBeCloseTo(expected, 3);
    });
  });
});

describe('a published estimate that the sanity check flags', () => {
  it('operator overflight, 7 May 2015: 14.6 US gallons over 9.7 × 0.5 statute miles is 0.0044 µm', () => {
    const areaM2 = fromUnit(9.7 * 0.5, AREA_UNITS.statuteSquareMile);
    expect(inUnit(areaM2, AREA_UNITS.km2)).toBeCloseTo(12.56, 2);
    const volumeM3 = fromUnit(14.6, VOLUME_UNITS.usGallon);
    expect(inUnit(volumeM3 / areaM2, THICKNESS_UNITS.um)).toBeCloseTo(0.0044, 4);
    const found = sanityChecks({ volumeM3, areaM2, coverage: 1 });
    expect(found.map(({ code }) => code)).toEqual(['mean-too-thin']);
    expect(found[0]!.text).toMatch(/0\.0044 µm.*at most 11 %/);
    // The satellite's figure for the same morning passes: 4,066 gallons over 5.95 square statute miles at 1 µm.
    expect(
      sanityChecks({
        volumeM3: fromUnit(4066, VOLUME_UNITS.usGallon),
        areaM2: fromUnit(5.95, AREA_UNITS.statuteSquareMile),
        coverage: 1,
      }),
    ).toEqual([]);
  });
});
