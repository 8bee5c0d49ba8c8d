import { describe, expect, it } from 'vitest';
import { photoViewOf } from '../../src/engine/photoView.ts';
import type { Setup } from '../../src/engine/setup.ts';
import { tallyPhoto } from '../../src/engine/tally.ts';
import type { PhotoMetadata } from '../../src/photo/types.ts';
import { atLeast, bare, film, glint, madeMap, outside } from '../tally/fields.ts';

const WIDTH = 80;
const HEIGHT = 60;
/** Left half film of 200 nm, right half bare, the top tenth outside. */
const map = madeMap(WIDTH, HEIGHT, (x, y) => (y < 6 ? outside : x < 40 ? film(200) : bare));
const setup: Setup = { film: 'diesel', references: { clean: [60, 30, 10, 10] } };
const slanted: Setup = { ...setup, view: { heightM: 3, focal35mm: 26, pitchDeg: -45, rollDeg: 0 } };
const metadata: PhotoMetadata = {
  fileName: 'made.jpg',
  mimeType: 'image/jpeg',
  byteLength: 1,
  sha256: '0'.repeat(64),
  originalWidth: WIDTH,
  originalHeight: HEIGHT,
  takenAt: '2026-06-21T12:00:00Z',
  takenAtHasOffset: true,
  profileName: 'sRGB',
  position: { latitudeDeg: 53.5, longitudeDeg: 8.1 },
};

const tallied = (given: Setup, ...rest: [] | [Parameters<typeof tallyPhoto>[3]]) =>
  tallyPhoto(map, given, photoViewOf(given, WIDTH, HEIGHT), ...rest);
const codesOf = (notices: readonly { readonly code: string }[]) => notices.map(({ code }) => code);

describe('the tally of a measured photo', () => {
  it('makes up no metres where the photo gives no scale, and says so', () => {
    const report = tallied(setup);
    expect(report.scale).toBe('pixels');
    expect(report.area).toBeNull();
    expect(report.byThickness).toBeNull();
    expect(report.byCode).toBeNull();
    expect(report.coverage).toEqual({ share: 0.5, least: 0.5, most: 0.5 });
    expect(report.regionShares).toEqual({ oiled: 0.5, bare: 0.5, unread: 0 });
    expect(report.shares.used).toEqual([1, 0, 0, 0, 0]);
    expect(report.histogram.share[20]).toBe(1);
    expect(report.countedPixels).toBe(WIDTH * 54);
    expect(codesOf(report.notices)).toContain('no-scale');
  });

  it('straight down, litres are thickness times pixels times their size', () => {
    const report = tallied({ ...setup, view: { pixelSizeM: 0.5 } });
    if (report.scale !== 'metres') throw new Error('a pixel size is a scale');
    expect(report.area.oiledM2).toBeCloseTo(40 * 54 * 0.25, 6);
    expect(report.byThickness.volumeM3.best).toBeCloseTo(1e-9 * 200 * 40 * 54 * 0.25, 12);
    // The code's own arithmetic for sheen: 0.04 to 0.3 um.
    expect(report.byCode?.minM3).toBeCloseTo(0.04e-6 * 540, 12);
    expect(report.byCode?.maxM3).toBeCloseTo(0.3e-6 * 540, 12);
    const { least, most } = report.byThickness.oiledM2;
    // A scale known to 5 % makes areas known to 10 %: 90 % of a log-normal lies within exp(+-1.645 x 0.1).
    expect(most / least).toBeCloseTo(Math.exp(2 * 1.645 * 0.1), 1);
  });

  it('at a slant, halves of the photo that mirror each other have equal areas, and every figure has an interval', () => {
    const report = tallied(slanted);
    if (report.scale !== 'metres') throw new Error('a view is a scale');
    expect(report.area.coverage).toBeCloseTo(0.5, 6);
    expect(report.incidenceDeg?.least).toBeGreaterThan(15);
    expect(report.incidenceDeg?.most).toBeLessThanOrEqual(75);
    const { least, best, most } = report.byThickness.volumeM3;
    expect(least).toBeLessThan(best);
    expect(most).toBeGreaterThan(best);
    expect(report.comparison?.codeFactor).toBeCloseTo(7.5, 6);
  });

  it('leaves out and counts what is seen too slanted', () => {
    const report = tallied({ ...slanted, view: { heightM: 3, focal35mm: 26, pitchDeg: -10, rollDeg: 0 } });
    if (report.scale !== 'metres') throw new Error('a view is a scale');
    expect(report.excludedShare).toBeGreaterThan(0.4);
    expect(report.incidenceDeg?.most).toBeLessThanOrEqual(75.0001);
    expect(codesOf(report.notices)).toEqual(
      expect.arrayContaining(['view-excluded', 'view-above-horizon', 'view-slanted']),
    );
  });

  it('works with the observer’s shares where there are any, and says where they come from', () => {
    const report = tallied(slanted, { shares: [0.5, 0.3, 0.2, 0, 0] });
    if (report.scale !== 'metres') throw new Error('a view is a scale');
    expect(report.shares.from).toBe('observer');
    expect(report.shares.ofMap).toEqual([1, 0, 0, 0, 0]);
    expect(report.byCode?.minM3).toBeCloseTo(
      report.area.oiledM2 * (0.5 * 0.04 + 0.3 * 0.3 + 0.2 * 5) * 1e-6,
      12,
    );
    expect(() => tallied(slanted, { shares: [0.5, 0.3, 0.1, 0, 0] })).toThrow(/90 %/);
  });

  it('the same seed gives the same interval, another one another', () => {
    const once = tallied(slanted, { seed: 7 });
    expect(tallied(slanted, { seed: 7 })).toEqual(once);
    expect(tallied(slanted, { seed: 8 }).byThickness).not.toEqual(once.byThickness);
  });

  it('says what the code was made for, but not to an observer in an aircraft', () => {
    expect(codesOf(tallied(slanted).notices)).toContain('code-scope');
    expect(codesOf(tallied(slanted, { viewpoint: 'aircraft' }).notices)).not.toContain('code-scope');
  });

  it('knows the sun where time and place are known, and warns of night', () => {
    const facts = (takenAt: string, takenAtHasOffset = true) => ({
      metadata: { ...metadata, takenAt, takenAtHasOffset },
    });
    const at = (takenAt: string, known = true) =>
      tallyPhoto(map, slanted, photoViewOf(slanted, WIDTH, HEIGHT), {}, facts(takenAt, known));
    // Solstice, near noon: 90 - 53.5 + 23.4 degrees.
    expect(at('2026-06-21T11:28:00Z').sun?.elevationDeg).toBeCloseTo(59.9, 0);
    expect(codesOf(at('2026-06-21T00:00:00Z').notices)).toContain('no-daylight');
    expect(at('2026-06-21T12:00:00', false).sun).toBeNull();
  });

  it('film past its colours and unread water show in shares and notices', () => {
    const mixed = madeMap(WIDTH, HEIGHT, (x) =>
      x < 20 ? film(200) : x < 40 ? atLeast(1300) : x < 60 ? bare : glint,
    );
    const report = tallyPhoto(mixed, setup, null);
    expect(report.atLeastShare).toBeCloseTo(0.5, 9);
    expect(report.coverage.share).toBeCloseTo(2 / 3, 9);
    expect(report.coverage.least).toBeCloseTo(0.5, 9);
    expect(report.coverage.most).toBeCloseTo(0.75, 9);
    expect(codesOf(report.notices)).toContain('code-open');
  });

  it('bare water has no shares and no volume by code', () => {
    const clean = madeMap(WIDTH, HEIGHT, () => bare);
    const report = tallyPhoto(clean, slanted, photoViewOf(slanted, WIDTH, HEIGHT));
    if (report.scale !== 'metres') throw new Error('a view is a scale');
    expect(report.coverage.share).toBe(0);
    expect(report.byThickness.volumeM3).toEqual({ least: 0, best: 0, most: 0 });
    expect(report.shares.used).toBeNull();
    expect(report.byCode).toBeNull();
  });
});
