import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { filmReflectance } from '../../src/optics/filmReflectance.ts';
import { ownMaterial } from '../../src/optics/materials/ownMaterial.ts';
import { reflectanceTable } from '../../src/optics/reflectanceTable.ts';
import { stackReflectance } from '../../src/optics/stackReflectance.ts';
import type { FilmStack, Material } from '../../src/optics/types.ts';

/** A medium of constant complex index, so that closed formulas apply. */
function constant(n: number, k = 0): Material {
  return {
    ...ownMaterial({ cauchyA: n, cauchyB: 0, k }),
    refractiveIndex: () => n,
  };
}

const index = fc.double({ min: 1, max: 4, noNaN: true });
const extinction = fc.double({ min: 0, max: 2, noNaN: true });
const angle = fc.double({ min: 0, max: (89.9 * Math.PI) / 180, noNaN: true });
const thickness = fc.double({ min: 0, max: 5000, noNaN: true });
const wavelength = fc.double({ min: 380, max: 780, noNaN: true });
const polarisation = fc.constantFrom('s' as const, 'p' as const, 'unpolarised' as const);

describe('film reflectance', () => {
  it('is that of the characteristic matrix for a single layer, to 1e-12', () => {
    fc.assert(
      fc.property(
        index,
        index,
        extinction,
        index,
        extinction,
        thickness,
        wavelength,
        angle,
        polarisation,
        (n0, n1, k1, n2, k2, d, l, a, pol) => {
          const [ambient, film, substrate] = [constant(n0), constant(n1, k1), constant(n2, k2)];
          const airy = filmReflectance({ ambient, above: [], film, below: [], substrate }, d, l, a, pol);
          // Beyond this absorption the matrix overflows double precision; nothing comes back from such a film.
          if ((4 * Math.PI * k1 * d) / l > 60) return;
          const matrix = stackReflectance(
            ambient,
            [{ material: film, thicknessNm: d }],
            substrate,
            l,
            a,
            pol,
          );
          expect(Math.abs(airy - matrix)).toBeLessThan(1e-12);
        },
      ),
      { numRuns: 400 },
    );
  });

  it('is that of the characteristic matrix with known layers above and below', () => {
    fc.assert(
      fc.property(
        index,
        index,
        index,
        index,
        thickness,
        wavelength,
        angle,
        polarisation,
        (a1, f, b1, s, d, l, a, pol) => {
          const ambient = constant(1);
          const above = [
            { material: constant(a1), thicknessNm: 90 },
            { material: constant(1.7), thicknessNm: 35 },
          ];
          const below = [
            { material: constant(b1), thicknessNm: 120 },
            { material: constant(2.1), thicknessNm: 60 },
          ];
          const stack: FilmStack = { ambient, above, film: constant(f), below, substrate: constant(s) };
          const layers = [...above, { material: stack.film, thicknessNm: d }, ...below];
          const matrix = stackReflectance(ambient, layers, stack.substrate, l, a, pol);
          expect(Math.abs(filmReflectance(stack, d, l, a, pol) - matrix)).toBeLessThan(1e-11);
        },
      ),
      { numRuns: 300 },
    );
  });

  it('lies between 0 and 1, and is the same from either side of a clear film', () => {
    fc.assert(
      fc.property(index, index, thickness, wavelength, polarisation, (n1, n2, d, l, pol) => {
        const [air, film, base] = [constant(1), constant(n1), constant(n2)];
        const down = filmReflectance(
          { ambient: air, above: [], film, below: [], substrate: base },
          d,
          l,
          0.7,
          pol,
        );
        // The ray that comes up has the angle of Snell's law.
        const up = filmReflectance(
          { ambient: base, above: [], film, below: [], substrate: air },
          d,
          l,
          Math.asin(Math.sin(0.7) / n2),
          pol,
        );
        expect(down).toBeGreaterThanOrEqual(0);
        expect(down).toBeLessThanOrEqual(1 + 1e-12);
        expect(Math.abs(down - up)).toBeLessThan(1e-10);
      }),
      { numRuns: 200 },
    );
  });

  it('refuses absurd angles and thicknesses in a sentence', () => {
    const stack: FilmStack = {
      ambient: constant(1),
      above: [],
      film: constant(1.33),
      below: [],
      substrate: constant(1),
    };
    expect(() => filmReflectance(stack, 100, 550, Math.PI / 2, 's')).toThrow(/between 0 and 89.9 degrees/);
    expect(() => filmReflectance(stack, -1, 550, 0, 's')).toThrow(/0 or more/);
    expect(() => filmReflectance(stack, Number.NaN, 550, 0, 's')).toThrow(/0 or more/);
  });
});

describe('reflectance table', () => {
  it('equals the pointwise reflectance to 1e-12 at every thickness', () => {
    const stack: FilmStack = {
      ambient: constant(1),
      above: [],
      film: constant(1.52, 0.01),
      below: [],
      substrate: constant(1.333),
    };
    const thicknessNm = Float64Array.from({ length: 500 }, (_, j) => 3 + j * 10);
    const wavelengthNm = Float64Array.of(380, 412.5, 550, 780);
    const table = reflectanceTable(stack, {
      thicknessNm,
      wavelengthNm,
      incidenceRad: 0.9,
      polarisation: 'unpolarised',
    });
    let worst = 0;
    thicknessNm.forEach((d, j) => {
      wavelengthNm.forEach((l, i) => {
        worst = Math.max(
          worst,
          Math.abs(table[j * 4 + i]! - filmReflectance(stack, d, l, 0.9, 'unpolarised')),
        );
      });
    });
    expect(worst).toBeLessThan(1e-12);
  });

  it('refuses thicknesses that do not step evenly', () => {
    const stack: FilmStack = {
      ambient: constant(1),
      above: [],
      film: constant(1.33),
      below: [],
      substrate: constant(1),
    };
    expect(() =>
      reflectanceTable(stack, {
        thicknessNm: Float64Array.of(0, 1, 3),
        wavelengthNm: Float64Array.of(550),
        incidenceRad: 0,
        polarisation: 's',
      }),
    ).toThrow(/evenly/);
  });
});
