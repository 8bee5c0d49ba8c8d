import { describe, expect, it } from 'vitest';
import { buildCodeChart } from '../../src/match/buildCodeChart.ts';
import { modelEvaluator } from '../../src/match/cameraModel.ts';
import { invertCovariance, searchable } from '../../src/match/codeChart.ts';
import { commonError, commonSdOfMean } from '../../src/match/commonError.ts';
import { pathRatio } from '../../src/match/filmBasis.ts';
import { AT, PARAMETERS } from '../../src/match/parameters.ts';
import { makeModes, posteriorReader } from '../../src/match/posterior.ts';
import { seededRandom } from '../../src/scene/random.ts';
import { fitAt, plausibleParameters, SOAP_SCENE, soapModel } from './soapModel.ts';

const DRAWS = 4000;
const LABELS = [80, 190, 330, 470];
const NOISE = { codes: [1.5, 1.2, 2], luma: 1, chroma: 1.5 } as const;
const SPREAD: readonly (readonly [number, number])[] = [
  ...[0, 1, 2, 3, 4, 5, 6, 7, 8].map((k) => [AT.sensor + k, 0.12] as const),
  ...[0, 1, 2].map((c) => [AT.logGain + c, 0.006] as const),
  [AT.veil + 1, 0.002],
  [AT.tone, 0.015],
  [AT.index, 0.004],
];

const model = soapModel(1, 700);
const mean = plausibleParameters();
const covariance = new Float64Array(PARAMETERS * PARAMETERS);
for (const [p, sd] of SPREAD) covariance[p * PARAMETERS + p] = sd * sd;
const scale = { factor: 1, perIndex: -1 / SOAP_SCENE.stack.film.refractiveIndex(550), relativeSd: 0 };
const chart = buildCodeChart(model, fitAt(mean, covariance), NOISE, scale, (d) => (d < 300 ? 1 : 2));

/** Codes of the labels at cameras drawn from the fit, and each camera's thickness by nominal thickness. */
const random = seededRandom('cameras');
const evaluator = modelEvaluator(model);
const cameras = Array.from({ length: DRAWS }, () => {
  const parameters = mean.slice();
  for (const [p, sd] of SPREAD) parameters[p]! += sd * random.normal();
  evaluator.moveTo(parameters, false);
  const codes = new Float64Array(3 * LABELS.length);
  LABELS.forEach((j, k) => {
    evaluator.codesAt(j, codes, 3 * k);
  });
  return { codes, ratio: pathRatio(SOAP_SCENE, parameters[AT.index]!) };
});

describe('chart of one photo against a Monte Carlo draw of 4000 cameras', () => {
  it('states the covariance that pixels of such cameras have', () => {
    LABELS.forEach((j, k) => {
      const seen = cameras.map(({ codes }) => {
        const luma = NOISE.luma * random.normal();
        const cb = NOISE.chroma * random.normal();
        const cr = NOISE.chroma * random.normal();
        // YCbCr to RGB as in ITU-T T.871 (the JPEG file interchange format).
        const shift = [luma + 1.402 * cr, luma - 0.344136 * cb - 0.714136 * cr, luma + 1.772 * cb];
        return [0, 1, 2].map((c) => codes[3 * k + c]! + shift[c]! + NOISE.codes[c]! * random.normal());
      });
      const middle = [0, 1, 2].map((c) => seen.reduce((sum, v) => sum + v[c]!, 0) / DRAWS);
      // x^T S^-1 x has mean 3 over draws with covariance S (chi square, 3 degrees of freedom), whatever the direction.
      let mahalanobis = 0;
      const w = 6 * j;
      const sample = new Float64Array(6);
      for (const v of seen) {
        const [x, y, z] = [v[0]! - middle[0]!, v[1]! - middle[1]!, v[2]! - middle[2]!];
        const p = chart.precision;
        mahalanobis +=
          (p[w]! * x * x +
            p[w + 1]! * y * y +
            p[w + 2]! * z * z +
            2 * (p[w + 3]! * x * y + p[w + 4]! * x * z + p[w + 5]! * y * z)) /
          DRAWS;
        [x * x, y * y, z * z, x * y, x * z, y * z].forEach((value, e) => {
          sample[e]! += value / (DRAWS - 1);
        });
      }
      const own = new Float64Array(1);
      invertCovariance(sample, new Float64Array(6), own, 0);
      // The mean of 4000 chi squares is sure to 1.3 %, the log determinant to 0.04; the law of propagation is first order.
      expect(Math.abs(mahalanobis / 3 - 1), `label ${j}`).toBeLessThan(0.06);
      expect(Math.abs(chart.logDeterminant[j]! - own[0]!), `label ${j}`).toBeLessThan(0.16);
    });
  });

  it('states how far all readings of such a camera are off together', () => {
    const read = posteriorReader(searchable(chart));
    const modes = makeModes();
    LABELS.forEach((j, k) => {
      let sum = 0;
      let square = 0;
      for (const { codes, ratio } of cameras) {
        read(codes[3 * k]!, codes[3 * k + 1]!, codes[3 * k + 2]!, modes);
        const error = modes.values[0]! - chart.thicknessNm[j]! * ratio;
        sum += error;
        square += error * error;
      }
      const spread = Math.sqrt(square / DRAWS - (sum / DRAWS) ** 2);
      expect(spread / chart.sharedSdNm[j]!, `label ${j}`).toBeGreaterThan(0.9);
      expect(spread / chart.sharedSdNm[j]!, `label ${j}`).toBeLessThan(1.1);
    });
  });

  it('tells how far off the mean of several thicknesses is, in which errors of opposite sign cancel', () => {
    const read = posteriorReader(searchable(chart));
    const modes = makeModes();
    const common = commonError(model, fitAt(mean, covariance), chart, scale);
    const areaAt = new Float64Array(chart.count);
    for (const j of LABELS) areaAt[j] = 1;
    let sum = 0;
    let square = 0;
    for (const { codes, ratio } of cameras) {
      let error = 0;
      LABELS.forEach((j, k) => {
        read(codes[3 * k]!, codes[3 * k + 1]!, codes[3 * k + 2]!, modes);
        error += (modes.values[0]! - chart.thicknessNm[j]! * ratio) / LABELS.length;
      });
      sum += error;
      square += error * error;
    }
    const spread = Math.sqrt(square / DRAWS - (sum / DRAWS) ** 2);
    const stated = commonSdOfMean(common, areaAt);
    expect(spread / stated).toBeGreaterThan(0.9);
    expect(spread / stated).toBeLessThan(1.1);
    // Were all errors of one sign, the mean's would be the mean of the labels' own.
    const ofOneSign = LABELS.reduce((total, j) => total + chart.sharedSdNm[j]!, 0) / LABELS.length;
    expect(stated).toBeLessThan(ofOneSign);
    // One label alone: the chart's own figure.
    for (const j of LABELS) {
      expect(
        commonSdOfMean(
          common,
          areaAt.map((_, i) => (i === j ? 3 : 0)),
        ),
      ).toBeCloseTo(chart.sharedSdNm[j]!, 4);
    }
  });

  it('has even steps scaled by the index, orders by thickness, and shares between 0 and 1', () => {
    const scaled = buildCodeChart(
      model,
      fitAt(mean, covariance),
      NOISE,
      { ...scale, factor: 0.99, relativeSd: 0.01 },
      (d) => (d < 300 ? 1 : 2),
    );
    expect(scaled.thicknessNm[500]!).toBeCloseTo(495, 9);
    expect([scaled.order[302], scaled.order[304]]).toEqual([1, 2]);
    expect(Math.min(...chart.noiseShare)).toBeGreaterThanOrEqual(0);
    expect(Math.max(...chart.noiseShare)).toBeLessThanOrEqual(1);
    expect(scaled.sharedSdNm[500]!).toBeGreaterThan(4.95);
  });
});
