import { differenceCiede2000 } from 'culori';
import { describe, expect, it } from 'vitest';
import { chartCsv } from '../../src/app/chart/chartCsv.ts';
import { chartEndNm, chartSvg, pocketCardSvg } from '../../src/app/chart/chartSvg.ts';
import {
  intervalAt,
  LIKE_DELTA_E,
  likeColours,
  markedPairs,
  NOISE_DELTA_E,
  orderAt,
  placeInRange,
} from '../../src/app/chart/likeColours.ts';
import { certaintyWords } from '../../src/app/chart/ReadingPanel.tsx';
import { colourAt, labelStepNm, strips } from '../../src/app/chart/rulerColumn.ts';
import { chartSetup, fileStem, setupLines } from '../../src/app/chart/setupWords.ts';
import { STATED_NOISE_DELTA_E } from '../../src/chart/chartView.ts';
import { chartFor } from '../../src/engine/chartFor.ts';
import type { Setup } from '../../src/engine/setup.ts';
import { scratch, tool } from '../record/tools.ts';

const DIESEL: Setup = { film: 'diesel', light: { daylightK: 6500 }, incidenceDeg: 30 };
const diesel = chartFor(DIESEL, 2000);
const soap = chartFor({ film: 'soap' }, 2000);
/** culori's CIEDE2000: not ours. */
const outsideDifference = differenceCiede2000();
const lab = (j: number) => ({
  mode: 'lab65' as const,
  l: diesel.lab[3 * j] ?? 0,
  a: diesel.lab[3 * j + 1] ?? 0,
  b: diesel.lab[3 * j + 2] ?? 0,
});

describe('like colours', () => {
  it('speaks of the noise that the chart states', () => {
    expect(NOISE_DELTA_E).toBe(STATED_NOISE_DELTA_E);
  });

  it('finds the likest of every other order, as culori measures it, and no other', () => {
    for (const nm of [35, 120, 250, 435, 580, 650, 930]) {
      const found = likeColours(diesel, nm);
      const own = orderAt(nm, diesel.orderBoundariesNm);
      const best = new Map<number, { nm: number; deltaE: number }>();
      for (let j = 0; j < diesel.count; j++) {
        const order = orderAt(j, diesel.orderBoundariesNm);
        if (order === own || Math.abs(j - nm) < 60) continue;
        const deltaE = outsideDifference(lab(nm), lab(j));
        if (deltaE <= LIKE_DELTA_E && deltaE < (best.get(order)?.deltaE ?? 99))
          best.set(order, { nm: j, deltaE });
      }
      expect(found.map(({ order }) => order).sort()).toEqual([...best.keys()].sort());
      for (const { order, deltaE } of found)
        expect(deltaE).toBeCloseTo(best.get(order)?.deltaE ?? Number.NaN, 3);
    }
  });

  it('lists the likest first', () => {
    const differences = likeColours(soap, 1600).map(({ deltaE }) => deltaE);
    expect(differences.length).toBeGreaterThan(2);
    expect(differences).toEqual([...differences].sort((a, b) => a - b));
  });

  it('marks one pair of each two orders, none of neighbours, none past the resolvable range', () => {
    const pairs = markedPairs(diesel);
    const keys = pairs.map(({ aNm, bNm }) =>
      [aNm, bNm].map((d) => orderAt(d, diesel.orderBoundariesNm)).join('-'),
    );
    expect(new Set(keys).size).toBe(keys.length);
    expect(pairs.length).toBeGreaterThan(4);
    for (const { aNm, bNm } of pairs) {
      expect(bNm - aNm).toBeGreaterThanOrEqual(60);
      expect(bNm).toBeLessThanOrEqual(diesel.resolvableNm.toNm);
    }
  });
});

describe('how well a colour tells', () => {
  it('gives the stretch that noise of 2 leaves at 90 %, as culori measures it', () => {
    const within = 1.6449 * NOISE_DELTA_E;
    for (const nm of [30, 150, 250, 435, 520, 700, 1000, 1200]) {
      const { lowNm, highNm } = intervalAt(diesel, nm);
      for (const j of [lowNm, highNm]) expect(outsideDifference(lab(nm), lab(j))).toBeLessThanOrEqual(within);
      if (lowNm > 0) expect(outsideDifference(lab(nm), lab(lowNm - 1))).toBeGreaterThan(within);
      expect(outsideDifference(lab(nm), lab(highNm + 1))).toBeGreaterThan(within);
    }
  });

  it('agrees with the slope that the resolvable range is stated by, where the chart is straight', () => {
    const straight = [310, 320, 330, 505, 510];
    for (const nm of straight) {
      const { lowNm, highNm } = intervalAt(diesel, nm);
      const bySlope = (2 * 1.6449 * NOISE_DELTA_E) / (diesel.sensitivityPerNm[nm] ?? 0);
      // Ends lie on whole nanometres, so up to 2 nm narrower; curvature is under a tenth here.
      expect(Math.abs(highNm - lowNm - bySlope)).toBeLessThan(2 + 0.1 * bySlope);
    }
  });

  it('knows the ends of the resolvable range', () => {
    const { fromNm, toNm } = diesel.resolvableNm;
    expect([fromNm - 1, fromNm, toNm, toNm + 1].map((nm) => placeInRange(diesel, nm))).toEqual([
      'tooThin',
      'within',
      'within',
      'tooThick',
    ]);
  });

  it('says so in words, and claims nothing where colour is gone', () => {
    expect(certaintyWords(diesel, 0)).toBe('Too thin to tell from none by colour.');
    expect(certaintyWords(diesel, 520)).toMatch(/^Order known: \d+ to \d+ nm \(90\u00a0%\)\.$/);
    expect(certaintyWords(diesel, 1900)).toMatch(/^Too pale to tell: say at least 1,[23]\d0 nm\.$/);
  });
});

describe('words of a set-up', () => {
  it('names film, surface, angle, light and observer', () => {
    expect(setupLines(DIESEL)).toEqual([
      'Diesel, gas oil',
      'On fresh water of 20 °C, 30° from the vertical',
      'Daylight of 6500 K (overcast), seen by eye (CIE 1931 observer)',
    ]);
    expect(setupLines({ film: 'soap', camera: 'phone', light: { illuminant: 'A' } }).slice(1)).toEqual([
      '0° from the vertical',
      'CIE illuminant A, seen by a typical phone camera',
    ]);
    expect(setupLines({ film: 'petrol', water: { temperatureC: 12, salinity: 35 } })[1]).toBe(
      'On water of 12 °C, salinity 35, 0° from the vertical',
    );
  });

  it('spells out a film of one’s own', () => {
    const film = { ambient: 'air', layers: [{ material: { nD: 1.5, k: 0.01 } }], substrate: 'pureWater' };
    expect(setupLines({ film })[1]).toBe('Air / n 1.5 k 0.01 (measured) / pureWater, 0° from the vertical');
  });

  it('leaves what belongs to a photo out of a chart', () => {
    expect(chartSetup({ ...DIESEL, pins: [], region: [[0, 0]], references: {} })).toEqual(DIESEL);
    expect(fileStem({ film: 'magnesiumFluorideOnGlass' })).toBe('coating-mgf2-on-glass-0deg');
  });
});

describe('the chart as a table', () => {
  it('is read by Python with every figure as it was', () => {
    const dir = scratch();
    try {
      const path = dir.write('chart.csv', chartCsv(diesel, DIESEL));
      const rows = JSON.parse(
        tool('python3', [
          '-c',
          'import csv, json, sys; print(json.dumps(list(csv.DictReader(open(sys.argv[1], newline="", encoding="utf-8"), strict=True))))',
          path,
        ]),
      ) as Record<string, string>[];
      expect(rows).toHaveLength(2001);
      for (const j of [0, 187, 188, 500, 2000]) {
        const row = rows[j] ?? {};
        expect(Number(row.thickness_nm)).toBe(j);
        expect(Number(row.order)).toBe(orderAt(j, diesel.orderBoundariesNm));
        for (const [name, value] of [
          ['X', diesel.xyz[3 * j]],
          ['L_star', diesel.lab[3 * j]],
          ['linear_srgb_b', diesel.linearRgb[3 * j + 2]],
          ['ciede2000_per_nm', diesel.sensitivityPerNm[j]],
        ] as const) {
          // Six significant digits are written.
          expect(Math.abs(Number(row[name]) / (value ?? Number.NaN) - 1), name).toBeLessThan(1e-5);
        }
        expect(Number(row.srgb_g_8bit)).toBe(diesel.displayRgb[3 * j + 1]);
        expect(row.film).toBe('diesel');
        expect(row.surface).toBe('on fresh water of 20 °C');
        expect(row.incidence_deg).toBe('30');
      }
    } finally {
      dir.remove();
    }
  });
});

describe('the chart as a drawing', () => {
  it('covers the stretch without a gap, each strip in the colour of its thickness', () => {
    const drawn = strips(diesel, { fromNm: 100, toNm: 300, x: 0, y: 10, width: 5, height: 400 });
    let reached = 10;
    for (const { text } of drawn) {
      const [, y, height, fill] = /y="([\d.]+)" width="5" height="([\d.]+)" fill="(.*)"/.exec(text) ?? [];
      expect(Number(y)).toBeLessThanOrEqual(reached + 0.011);
      expect(fill).toBe(colourAt(diesel, 100 + (Number(y) - 10) / 2 + 0.5));
      reached = Number(y) + Number(height);
    }
    expect(reached).toBeCloseTo(410, 2);
  });

  it('leaves labels room to breathe', () => {
    for (const [toNm, height] of [
      [1000, 1000],
      [2000, 300],
      [5000, 260],
    ] as const) {
      expect((labelStepNm(toNm, height, 12) / toNm) * height).toBeGreaterThanOrEqual(2 * 12);
    }
  });

  it('carries set-up, version and limits on sheet and card, and escapes every word', () => {
    const film = { ambient: 'air', layers: [{ material: '<b>&"' }], substrate: 'pureWater' };
    for (const svg of [chartSvg(diesel, DIESEL, '9.9.9'), pocketCardSvg(diesel, DIESEL, '9.9.9')]) {
      for (const line of setupLines(DIESEL)) expect(svg).toContain(`>${line}<`);
      expect(svg).toContain('Tintfathom 9.9.9');
      expect(svg).toMatch(/say &quot;at least 1\d{3} nm&quot;/);
      expect(svg).not.toContain('style=');
    }
    expect(pocketCardSvg(diesel, { film }, '1')).not.toContain('<b>');
    expect(chartEndNm(diesel)).toBe(2000);
  });
});
