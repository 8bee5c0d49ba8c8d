/**
 * Appearance steps of oil on water, from laboratory films: Hornstein 1973 and the API table (nominal thickness 0.038,
 * 0.076, 0.15, 0.3, 1.0, 2.0 um; the last two from memory). Brightness and chroma figures: textbook optics for a film
 * of 1.47 on water 1.34, equal-energy white, worked out apart from this project (two digits).
 */
import { describe, expect, it } from 'vitest';
import { chartView } from '../../src/chart/chartView.ts';
import { SHARP } from '../../src/optics/blur.ts';
import { filmStackFor } from '../../src/optics/filmPresets.ts';

const view = (spread: number) =>
  chartView({
    stack: filmStackFor('diesel'),
    light: { daylightK: 6500 },
    observer: 'cie1931',
    incidenceRad: 0,
    blur: { ...SHARP, relativeThicknessSpread: spread },
    maxThicknessNm: 2200,
  });
const sharp = view(0);
const brightness = (nm: number) => sharp.xyz[3 * nm + 1]! / sharp.xyz[1]!;
const chroma = (nm: number, of = sharp) => Math.hypot(of.lab[3 * nm + 1]!, of.lab[3 * nm + 2]!);

describe('appearance of oil on water against thickness', () => {
  it('is barely visible at 38 nm: about half as bright again as bare water, hardly a hue', () => {
    expect(brightness(38)).toBeGreaterThan(1.4);
    expect(brightness(38)).toBeLessThan(1.8);
    expect(chroma(38)).toBeLessThan(14);
  });

  it('is silvery at 76 nm: far brighter than water, without hue', () => {
    expect(brightness(76)).toBeGreaterThan(2.2);
    expect(chroma(76)).toBeLessThan(chroma(150));
    expect(chroma(76)).toBeLessThan(12);
  });

  it('shows the first trace of colour at 150 nm and bright bands at 300 nm', () => {
    expect(chroma(150)).toBeGreaterThan(2 * chroma(76));
    const best = Math.max(...Array.from({ length: 200 }, (_, i) => chroma(200 + i)));
    const early = Math.max(...Array.from({ length: 130 }, (_, i) => chroma(i)));
    expect(best).toBeGreaterThan(2 * early);
    expect(chroma(300)).toBeGreaterThan(25);
  });

  it('turns dull from 1 um and is without colour at 2 um', () => {
    const peak = (from: number, to: number) =>
      Math.max(...Array.from({ length: to - from }, (_, i) => chroma(from + i)));
    expect(peak(900, 1100)).toBeLessThan(0.6 * peak(250, 450));
    expect(peak(1900, 2100)).toBeLessThan(0.25 * peak(900, 1100) + 2);
  });

  it('loses its colour sooner where the film is patchy inside a pixel', () => {
    const patchy = view(0.15);
    expect(chroma(500, patchy)).toBeLessThan(0.6 * chroma(500));
    expect(chroma(1000, patchy)).toBeLessThan(3);
  });
});
