import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { incidenceWords, skyWords } from '../../src/app/words/names.ts';
import { intervalText, orderText, shareText, thicknessText } from '../../src/app/words/numbers.ts';
import { readingWords, summaryWords } from '../../src/app/words/reading.ts';
import type { EstimateSummary, Probe } from '../../src/engine/contract.ts';
import { PIXEL_STATUS } from '../../src/match/types.ts';
import { thicknessStepNm } from '../../src/tally/rounding.ts';

const PROBE: Probe = {
  x: 1,
  y: 1,
  seen: [120, 90, 60],
  matched: [121, 90, 61],
  thicknessNm: Float32Array.of(0, 1),
  posteriorAlone: Float32Array.of(0, 1),
  posteriorWithNeighbours: Float32Array.of(0, 1),
  orderBoundariesNm: [250, 480],
  readings: [
    { thicknessNm: 311, lowNm: 296, highNm: 327, order: 2, share: 0.8 },
    { thicknessNm: 507, lowNm: 491, highNm: 523, order: 3, share: 0.2 },
  ],
  status: PIXEL_STATUS.measured,
  mapThicknessNm: 311,
  mapLowNm: 296,
  mapHighNm: 327,
};

describe('the sentence of a reading', () => {
  it('is what a person would say', () => {
    expect(readingWords(PROBE, 1000)).toEqual({
      big: '310 nm',
      quiet: '295 to 330 nm · second order',
      sentence: '9 in 10 sure; next best 505 nm.',
    });
  });

  it('says that it is not sure where orders fit alike', () => {
    const words = readingWords({ ...PROBE, status: PIXEL_STATUS.ambiguous }, 1000);
    expect(words.sentence).toMatch(/^Order not sure: it could be 505 nm/);
  });

  it('leaves out another order that is hardly possible', () => {
    const readings = PROBE.readings.map((r, i) => ({ ...r, share: i === 0 ? 0.97 : 0.03 }));
    expect(readingWords({ ...PROBE, readings }, 1000).sentence).not.toContain('next best');
  });

  it('gives a lower bound, never a guess, past the end of colour', () => {
    const words = readingWords(
      { ...PROBE, status: PIXEL_STATUS.atLeast, mapThicknessNm: Number.NaN, mapHighNm: Number.NaN },
      1264,
    );
    expect(words.big).toBe('Over 1,250 nm');
    expect(JSON.stringify(words)).not.toContain('NaN');
  });

  it('has words for every state of a place, and no number where there is none', () => {
    for (const status of [PIXEL_STATUS.bare, PIXEL_STATUS.outside, PIXEL_STATUS.noFilmColour]) {
      const words = readingWords({ ...PROBE, status, mapThicknessNm: Number.NaN }, 1000);
      expect(JSON.stringify(words)).not.toMatch(/NaN|\d/);
    }
  });
});

describe('numbers', () => {
  it('carry no more digits than their interval allows', () => {
    expect(thicknessText(1238.4, 90)).toBe('1,240');
    expect(thicknessText(311.2, 31)).toBe('310');
    expect(thicknessText(311.2, 6)).toBe('311');
  });

  it('round an interval outwards: what was inside stays inside', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 4000, noNaN: true }),
        fc.double({ min: 0.5, max: 800, noNaN: true }),
        (low, width) => {
          const [from, to] = intervalText(low, low + width)
            .split(' to ')
            .map((text) => Number(text.replaceAll(',', '')));
          expect(from).toBeLessThanOrEqual(low + 1e-3);
          expect(to).toBeGreaterThanOrEqual(low + width - 1e-3);
          // Rounding widens by less than a step at each end.
          expect((to ?? 0) - (from ?? 0)).toBeLessThan(width + 2 * thicknessStepNm(width));
        },
      ),
    );
  });

  it('say a share without hiding what is there', () => {
    expect(shareText(1, 1000)).toBe('under 1\u00a0%');
    expect(shareText(0, 1000)).toBe('0\u00a0%');
    expect(shareText(424, 1000)).toBe('42\u00a0%');
    expect(shareText(0, 0)).toBe('0\u00a0%');
  });

  it('name orders', () => {
    expect(orderText(2)).toBe('second order');
    expect(orderText(11)).toBe('11th order');
  });
});

describe('sky and angle', () => {
  it('run from low sun to clear blue and from straight down to low', () => {
    const skies = [4600, 5500, 6500, 8000, 12000].map(skyWords);
    expect(new Set(skies).size).toBe(5);
    expect(skies[2]).toBe('overcast');
    expect(skies[4]).toBe('clear blue sky');
    expect(incidenceWords(0, true)).toBe('Straight down');
    expect(incidenceWords(0, false)).toBe('Straight at the film');
    expect(incidenceWords(70, true)).toBe(incidenceWords(70, false));
  });
});

describe('the words of a map', () => {
  const summary = (
    counts: Partial<EstimateSummary['counts']>,
    quantilesNm: EstimateSummary['quantilesNm'],
  ): EstimateSummary => ({
    calibrated: true,
    counts: {
      total: 1000,
      inRegion: 1000,
      measured: 0,
      bare: 0,
      ambiguous: 0,
      atLeast: 0,
      noFilmColour: 0,
      ...counts,
    },
    quantilesNm,
    resolvableNm: { fromNm: 20, toNm: 1000 },
    fit: null,
    notices: [],
    timingsMs: {},
  });
  const quantiles = { p05: 0, p25: 0, p50: 104, p75: 200, p95: 372 };

  it('say how much is film and how thick', () => {
    expect(summaryWords(summary({ measured: 500, ambiguous: 30, bare: 440 }, quantiles))).toBe(
      'Film on 53\u00a0% of the region, bare surface on 44\u00a0%. Half of what was read is under 105 nm, 95 % of it under 370 nm.',
    );
  });

  it('never say "under 0 nm"', () => {
    const words = summaryWords(summary({ measured: 300, bare: 700 }, { ...quantiles, p50: 0 }));
    expect(words).toContain('95 % of what was read is under 370 nm');
    expect(words).not.toContain('under 0 nm');
  });

  it('say so where there is only bare surface, or no film colour at all', () => {
    expect(summaryWords(summary({ bare: 1000 }, { p05: 0, p25: 0, p50: 0, p75: 0, p95: 0 }))).toMatch(
      /^Only bare/,
    );
    expect(summaryWords(summary({ noFilmColour: 1000 }, null))).toMatch(/^No film colours/);
  });
});
