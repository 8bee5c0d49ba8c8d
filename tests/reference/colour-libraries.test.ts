/** Our typed-array functions against two general-purpose libraries, culori and colorjs.io, on seeded random colours. */
import Color from 'colorjs.io';
import { converter, differenceCiede2000 } from 'culori';
import { describe, expect, test } from 'vitest';
import { deltaE2000 } from '../../src/colour/deltaE2000.ts';
import { labFromXyz } from '../../src/colour/lab.ts';
import { apply3, invert3, multiply3 } from '../../src/colour/matrix3.ts';
import { oklabFromXyz } from '../../src/colour/oklab.ts';
import { DISPLAY_P3, SRGB } from '../../src/colour/rgb.ts';

/** Codes 0..1, triples: a plain congruential sequence, so that the test is the same on every run. */
const codes = (() => {
  let state = 20240;
  return Array.from({ length: 500 }, () =>
    Array.from({ length: 3 }, () => {
      state = (state * 1103515245 + 12345) % 2147483648;
      return state / 2147483648;
    }),
  ) as [number, number, number][];
})();

const xyzOf = (rgb: readonly number[]) =>
  apply3(SRGB.toXyz, [SRGB.decode(rgb[0]!), SRGB.decode(rgb[1]!), SRGB.decode(rgb[2]!)]);
const lab = labFromXyz(
  codes.flatMap((rgb) => [...xyzOf(rgb)]),
  SRGB.whiteXyz,
);
const largest = (differences: number[]) => differences.reduce((most, d) => Math.max(most, Math.abs(d)), 0);

describe('culori', () => {
  const toLab65 = converter('lab65');
  const toOklab = converter('oklab');
  const toP3 = converter('p3');

  test('CIELAB for D65', () => {
    const off = codes.flatMap(([r, g, b], k) => {
      const theirs = toLab65({ mode: 'rgb', r, g, b });
      return [theirs.l - lab[3 * k]!, theirs.a - lab[3 * k + 1]!, theirs.b - lab[3 * k + 2]!];
    });
    expect(largest(off)).toBeLessThan(1e-9);
  });

  test('CIEDE2000', () => {
    const difference = differenceCiede2000();
    const off = codes.slice(1).map((_, k) => {
      const [a, b] = [k, k + 1].map((i) => ({
        mode: 'lab65' as const,
        l: lab[3 * i]!,
        a: lab[3 * i + 1]!,
        b: lab[3 * i + 2]!,
      }));
      return difference(a!, b!) - deltaE2000(lab, k, lab, k + 1);
    });
    expect(largest(off)).toBeLessThan(1e-9);
  });

  test('OKLab', () => {
    const off = codes.flatMap(([r, g, b]) => {
      const theirs = toOklab({ mode: 'rgb', r, g, b });
      const ours = oklabFromXyz(xyzOf([r, g, b]));
      return [theirs.l - ours[0]!, theirs.a - ours[1]!, theirs.b - ours[2]!];
    });
    expect(largest(off)).toBeLessThan(1e-9);
  });

  test('sRGB to Display P3', () => {
    const toP3Linear = multiply3(invert3(DISPLAY_P3.toXyz), SRGB.toXyz);
    const off = codes.flatMap(([r, g, b]) => {
      const theirs = toP3({ mode: 'rgb', r, g, b });
      const ours = apply3(toP3Linear, [SRGB.decode(r), SRGB.decode(g), SRGB.decode(b)]).map(
        DISPLAY_P3.encode,
      );
      return [theirs.r - ours[0]!, theirs.g - ours[1]!, theirs.b - ours[2]!];
    });
    expect(largest(off)).toBeLessThan(1e-9);
  });
});

describe('colorjs.io', () => {
  const coordinates = (rgb: [number, number, number], space: string) =>
    new Color('srgb', rgb).to(space).coords.map(Number);

  test.each([
    ['xyz-d65', (rgb: number[]) => xyzOf(rgb)],
    ['oklab', (rgb: number[]) => oklabFromXyz(xyzOf(rgb))],
    ['lab-d65', (rgb: number[]) => labFromXyz(xyzOf(rgb), SRGB.whiteXyz)],
  ] as const)('%s', (space, ours) => {
    const off = codes.flatMap((rgb) => {
      const mine = ours(rgb);
      return coordinates(rgb, space).map((value, c) => value - mine[c]!);
    });
    expect(largest(off)).toBeLessThan(1e-9);
  });

  test('CIEDE2000', () => {
    const triple = (k: number) => [lab[3 * k]!, lab[3 * k + 1]!, lab[3 * k + 2]!] as [number, number, number];
    // Named `lab`, because colorjs.io adapts colours of any other space to D50 before it compares them.
    const off = codes.slice(1).map((_, k) => {
      const theirs = new Color('lab', triple(k)).deltaE(new Color('lab', triple(k + 1)), '2000');
      return theirs - deltaE2000(lab, k, lab, k + 1);
    });
    expect(largest(off)).toBeLessThan(1e-9);
  });
});
