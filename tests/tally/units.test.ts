import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { formatInterval, roundToInterval } from '../../src/tally/rounding.ts';
import {
  AREA_UNITS,
  filmVolumeM3,
  fromUnit,
  inUnit,
  LENGTH_UNITS,
  readableAreaUnit,
  readableVolumeUnit,
  THICKNESS_UNITS,
  VOLUME_UNITS,
} from '../../src/tally/units.ts';

const all = [THICKNESS_UNITS, VOLUME_UNITS, AREA_UNITS, LENGTH_UNITS].flatMap((units) =>
  Object.values(units),
);

describe('units', () => {
  it('there and back for every unit', () => {
    fc.assert(
      fc.property(fc.constantFrom(...all), fc.double({ min: 1e-6, max: 1e9, noNaN: true }), (unit, value) => {
        expect(inUnit(fromUnit(value, unit), unit) / value).toBeCloseTo(1, 14);
      }),
    );
  });

  it('says which mile and which gallon', () => {
    for (const unit of all) {
      if (/mile/i.test(unit.id)) {
        expect(unit.name).toMatch(/nautical|statute/);
      }
      if (/gallon/i.test(unit.id)) {
        expect(unit.name).toMatch(/US|imperial/);
      }
    }
    expect(new Set(all.map(({ symbol }) => symbol)).size).toBe(all.length);
  });

  it('volumes and areas are shown in the unit that reads best', () => {
    expect([5e-9, 2e-5, 0.3, 12].map((m3) => readableVolumeUnit(m3).symbol)).toEqual(['µL', 'mL', 'L', 'm³']);
    expect(readableVolumeUnit(0).symbol).toBe('mL');
    expect([12, 3e4, 4e6].map((m2) => readableAreaUnit(m2).symbol)).toEqual(['m²', 'ha', 'km²']);
  });

  it('1 nm over 1 m² is 1e-9 m³, 1 µm over 1 m² is 1 mL', () => {
    expect(filmVolumeM3(1, 1)).toBe(1e-9);
    expect(filmVolumeM3(1000, 1)).toBeCloseTo(fromUnit(1, VOLUME_UNITS.mL), 18);
  });
});

describe('digits', () => {
  it('none beyond what the interval allows', () => {
    expect(roundToInterval(312.4567, 295, 330)).toBe(312);
    expect(roundToInterval(312.4567, 250, 380)).toBe(310);
    expect(roundToInterval(0.0123456, 0.012, 0.0128)).toBe(0.0123);
    expect(roundToInterval(0.0123456, 0.0123, 0.01242)).toBe(0.01235);
    expect(roundToInterval(98765, 60000, 150000)).toBe(100000);
    expect(roundToInterval(1234.5, 1234.5, 1234.5)).toBe(1230);
    expect(roundToInterval(0, -1, 1)).toBe(0);
    expect(roundToInterval(Number.NaN, 0, 1)).toBeNaN();
  });

  it('the printed ends hold the found ones, and all three share a decimal place', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1e-6, max: 1e6, noNaN: true }),
        fc.double({ min: 0.01, max: 0.9, noNaN: true }),
        fc.double({ min: 0.01, max: 3, noNaN: true }),
        (value, below, above) => {
          const [low, high] = [value * (1 - below), value * (1 + above)];
          const printed = formatInterval(low, value, high);
          expect(Number(printed.low)).toBeLessThanOrEqual(low * (1 + 1e-6));
          expect(Number(printed.high)).toBeGreaterThanOrEqual(high * (1 - 1e-6));
          const decimals = [printed.low, printed.value, printed.high].map(
            (text) => text.split('.')[1]?.length ?? 0,
          );
          expect(new Set(decimals).size).toBe(1);
          // One step is at most a 3.55th of half the width: a seventh of the interval.
          expect(Number(printed.high) - high).toBeLessThan(0.142 * (high - low));
          expect(Math.abs(Number(printed.value) - value)).toBeLessThan(0.071 * (high - low));
        },
      ),
    );
  });

  it('an empty interval and a missing end still print', () => {
    expect(formatInterval(5, 5, 5)).toEqual({ low: '5.00', value: '5.00', high: '5.00' });
    expect(formatInterval(0, 0, 0.03)).toEqual({ low: '0.000', value: '0.000', high: '0.030' });
    expect(formatInterval(1, 2, Number.NaN).high).toBe('–');
  });
});
