/**
 * Newton's table of the colours of thin plates of water: Opticks, 1704, Book II, Part II. Thickness in millionths of
 * an English inch (25.4 nm); values from memory. Light taken as daylight of 5500 K, observer CIE 1931, normal incidence.
 */
import { describe, expect, it } from 'vitest';
import { chartView } from '../../src/chart/chartView.ts';
import { SHARP } from '../../src/optics/blur.ts';
import { air } from '../../src/optics/materials/air.ts';
import { pureWater } from '../../src/optics/materials/water.ts';

const NM = 25.4;

/** CIELAB hue angles that a hue name covers, degrees; wide, because names are. */
const FAMILIES: Readonly<Record<string, readonly [number, number]>> = {
  red: [330, 60],
  orange: [45, 100],
  yellow: [80, 125],
  green: [110, 200],
  blue: [190, 285],
  indigo: [240, 310],
  violet: [290, 345],
  purple: [300, 350],
};

/** Order, his word, its family, thickness. */
const TABLE: readonly (readonly [number, string, keyof typeof FAMILIES, number])[] = [
  [1, 'blue', 'blue', 1.8],
  [1, 'yellow', 'yellow', 5 + 1 / 3],
  [1, 'orange', 'orange', 6],
  [1, 'red', 'red', 6.75],
  [2, 'violet', 'violet', 8.375],
  [2, 'indigo', 'indigo', 9.625],
  [2, 'blue', 'blue', 10.5],
  [2, 'green', 'green', 11 + 1 / 3],
  [2, 'yellow', 'yellow', 12.2],
  [2, 'orange', 'orange', 13],
  [2, 'bright red', 'red', 13.75],
  [2, 'scarlet', 'red', 14.75],
  [3, 'purple', 'purple', 15.75],
  [3, 'indigo', 'indigo', 16 + 4 / 7],
  [3, 'blue', 'blue', 17.55],
  [3, 'green', 'green', 18.9],
  [3, 'yellow', 'yellow', 20 + 1 / 3],
  [3, 'red', 'red', 21.75],
  [3, 'bluish red', 'red', 24],
];

/** Where ours and his part: his first-order red and second-order bright red come out orange-yellow here, 3 to 10 % early. */
const MISFITS = ['1 red', '2 bright red', '3 bluish red'];

const view = chartView({
  stack: { ambient: air, above: [], film: pureWater, below: [], substrate: air },
  light: { daylightK: 5500 },
  observer: 'cie1931',
  incidenceRad: 0,
  blur: SHARP,
  maxThicknessNm: 1000,
});
const hueAt = (nm: number) => {
  const j = Math.round(nm);
  return ((Math.atan2(view.lab[3 * j + 2]!, view.lab[3 * j + 1]!) * 180) / Math.PI + 360) % 360;
};
const within = (hue: number, [from, to]: readonly [number, number]) =>
  from <= to ? hue >= from && hue <= to : hue >= from || hue <= to;

describe("Newton's colours of thin plates", () => {
  it('finds the hue he names at his thickness, but for three that are reported', () => {
    const missed = TABLE.filter(([, , family, t]) => !within(hueAt(t * NM), FAMILIES[family]!));
    const lines = missed.map(
      ([order, word, , t]) =>
        `${order} ${word} at ${(t * NM).toFixed(0)} nm: our hue is ${hueAt(t * NM).toFixed(0)}°`,
    );
    if (lines.length > 0) console.log(`Newton's hues that do not fit:\n  ${lines.join('\n  ')}`);
    expect(missed.map(([order, word]) => `${order} ${word}`)).toEqual(MISFITS);
  });

  it('is very black, black, then blue before the first white', () => {
    expect(view.lab[3 * Math.round(0.375 * NM)]!).toBeLessThan(20);
    expect(view.lab[3 * Math.round(0.75 * NM)]!).toBeLessThan(35);
    const white = 3 * Math.round(3.875 * NM);
    expect(Math.hypot(view.lab[white + 1]!, view.lab[white + 2]!)).toBeLessThan(8);
    expect(view.lab[white]!).toBeGreaterThan(88);
  });

  /** Thickness in [from, to] where the hue, falling, passes an angle. */
  const passes = (angle: number, from: number, to: number) => {
    const turn = (d: number) => ((hueAt(d) - angle + 540) % 360) - 180;
    for (let d = from; d < to; d++) if (turn(d) > 0 && turn(d + 1) <= 0 && turn(d) < 90) return d;
    return Number.NaN;
  };

  it('ends orders 2 and 3 in the red or purple within 6 % of his scarlet (375 nm) and bluish red (610 nm)', () => {
    expect(Math.abs(passes(0, 340, 430) / (14.75 * NM) - 1)).toBeLessThan(0.06);
    expect(Math.abs(passes(330, 560, 680) / (24 * NM) - 1)).toBeLessThan(0.06);
  });

  it('ends order 1 between his red (171 nm) and the violet that follows (213 nm); his red itself is 9 % thinner than ours', () => {
    const end = passes(0, 150, 230);
    expect(end).toBeGreaterThan(6.75 * NM);
    expect(end).toBeLessThan(8.375 * NM);
  });
});
