/**
 * When thickness, camera and noise are drawn from what the reader believes of them, its 90 % intervals must hold the
 * truth 90 % of the time: the definition of a credible interval (Dawid 1982, "The well-calibrated Bayesian").
 */
import { describe, expect, it } from 'vitest';
import { buildCodeChart } from '../../src/match/buildCodeChart.ts';
import { modelEvaluator } from '../../src/match/cameraModel.ts';
import { searchable } from '../../src/match/codeChart.ts';
import { pathRatio } from '../../src/match/filmBasis.ts';
import { finishRows } from '../../src/match/finishRows.ts';
import { makeMapRows } from '../../src/match/mapPixels.ts';
import { AT, PARAMETERS } from '../../src/match/parameters.ts';
import { MODE_FIELDS, makeModes, posteriorReader } from '../../src/match/posterior.ts';
import { PIXEL_STATUS } from '../../src/match/types.ts';
import { seededRandom } from '../../src/scene/random.ts';
import { fitAt, plausibleParameters, SOAP_SCENE, soapModel } from '../match/soapModel.ts';

const NOISE = { codes: [2, 2, 2], luma: 0, chroma: 0 } as const;
const MOST_NM = 1300;
const RULES = {
  outlierDistance: Number.POSITIVE_INFINITY,
  bareNm: 0,
  resolvableNm: Number.POSITIVE_INFINITY,
  ambiguityMargin: 0,
};

/** Nominal thickness from the prior that the reader states, density as (d + 100 nm)^-1.5, by its inverse. */
function drawThickness(share: number, fromNm: number, toNm: number): number {
  const a = (fromNm + 100) ** -0.5;
  const b = (toNm + 100) ** -0.5;
  return (a + share * (b - a)) ** -2 - 100;
}

/** Of `cameras` times `pixels` readings, the share whose interval holds the truth. */
function coverage(
  stepNm: number,
  covariance: Float64Array | undefined,
  sds: readonly (readonly [number, number])[],
): number {
  const model = soapModel(stepNm, MOST_NM);
  const evaluator = modelEvaluator(model);
  const [cameras, pixels] = sds.length > 0 ? [3000, 10] : [1, 30000];
  const mean = plausibleParameters();
  const perIndex = -1 / SOAP_SCENE.stack.film.refractiveIndex(550);
  const chart = buildCodeChart(
    model,
    fitAt(mean, covariance),
    NOISE,
    { factor: 1, perIndex, relativeSd: 0 },
    () => 1,
  );
  const read = posteriorReader(searchable(chart));
  const random = seededRandom('coverage');
  const modes = makeModes();
  const parameters = mean.slice();
  const below = new Float64Array(3);
  const above = new Float64Array(3);
  const rows = makeMapRows(1, 0, 1);
  let held = 0;
  for (let camera = 0; camera < cameras; camera++) {
    for (const [p, sd] of sds) parameters[p] = mean[p]! + sd * random.normal();
    evaluator.moveTo(parameters, false);
    const ratio = pathRatio(SOAP_SCENE, parameters[AT.index]!);
    for (let n = 0; n < pixels; n++) {
      const nominal = drawThickness(random.next(), 60, MOST_NM - 100);
      const j = Math.floor(nominal / stepNm);
      evaluator.codesAt(j, below, 0);
      evaluator.codesAt(j + 1, above, 0);
      const [r, g, b] = [0, 1, 2].map(
        (c) => below[c]! + (nominal / stepNm - j) * (above[c]! - below[c]!) + 2 * random.normal(),
      );
      read(r!, g!, b!, modes);
      // Neighbours settle the order: the reading nearest the truth is taken.
      const truth = nominal * ratio;
      let chosen = 0;
      for (let k = 1; k < modes.count; k++) {
        const gap = (m: number) => Math.abs(modes.values[m * MODE_FIELDS]! - truth);
        if (gap(k) < gap(chosen)) chosen = k;
      }
      rows.thicknessNm[0] = modes.values[chosen * MODE_FIELDS]!;
      rows.lowNm[0] = modes.values[chosen * MODE_FIELDS + 1]!;
      rows.highNm[0] = modes.values[chosen * MODE_FIELDS + 2]!;
      rows.status[0] = PIXEL_STATUS.measured;
      finishRows(rows, chart, RULES, null);
      if (rows.lowNm[0]! <= truth && truth <= rows.highNm[0]!) held++;
    }
  }
  return held / (cameras * pixels);
}

describe('coverage of the 90 % interval where the model is right', () => {
  const ofDraws = Math.sqrt((0.9 * 0.1) / 30000);

  it('a known camera, chart every half nanometre: 90 % within four standard errors of 30 000 draws', () => {
    expect(Math.abs(coverage(0.5, undefined, []) - 0.9)).toBeLessThan(4 * ofDraws);
  });

  it('a known camera, chart every nanometre as for photos: never short, and at most 3 points wide', () => {
    // Where colours change so fast that a reading is sure to half a nanometre, a step of one widens the interval.
    const found = coverage(1, undefined, []);
    expect(found).toBeGreaterThan(0.9 - 4 * ofDraws);
    expect(found).toBeLessThan(0.93);
  });

  it('a camera and an index known only so far: 90 % within four standard errors of 3000 cameras', () => {
    const sds: [number, number][] = [
      ...[0, 1, 2, 3, 4, 5, 6, 7, 8].map((k): [number, number] => [AT.sensor + k, 0.15]),
      ...[0, 1, 2].map((c): [number, number] => [AT.logGain + c, 0.01]),
      ...[0, 1, 2].map((c): [number, number] => [AT.veil + c, 0.002]),
      [AT.tone, 0.02],
      [AT.index, 0.004],
    ];
    const covariance = new Float64Array(PARAMETERS * PARAMETERS);
    for (const [p, sd] of sds) covariance[p * PARAMETERS + p] = sd * sd;
    // Ten pixels of a camera share its error: between 3000 and 30 000 independent draws; the careful end is taken.
    const error = Math.sqrt((0.9 * 0.1) / 3000);
    expect(Math.abs(coverage(1, covariance, sds) - 0.9)).toBeLessThan(4 * error);
  });
});
