import { describe, expect, it } from 'vitest';
import { SENSOR_DEPARTURES } from '../../src/colour/sensorDepartures.ts';
import {
  atNextPhoto,
  type CameraKnowledge,
  cameraKnowledge,
  chiSquareTail,
  conflictWith,
  KEPT,
  KEPT_PLACES,
  withCamera,
} from '../../src/match/cameraKnowledge.ts';
import { AT, PARAMETERS, statedPrior } from '../../src/match/parameters.ts';
import { choleskyInPlace, inverseOf } from '../../src/match/symmetric.ts';
import { seededRandom } from '../../src/scene/random.ts';

const prior = statedPrior(
  { commonGain: 0.3, channelGain: 0.15, veil: 0.02, index: 0.005, mired: 25 },
  new Float64Array(PARAMETERS),
);
const MATRIX = [1.8, -0.7, -0.1, -0.25, 1.6, -0.35, 0, -0.6, 1.6];
const random = seededRandom('camera knowledge');

/** A correlated positive definite matrix whose standard deviations are `sd` or more. */
function spread(n: number, sd: number): Float64Array {
  const factor = Float64Array.from({ length: n * n }, () => random.normal());
  const out = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      let sum = i === j ? 1 : 0;
      for (let k = 0; k < n; k++) sum += (factor[i * n + k]! * factor[j * n + k]!) / n;
      out[i * n + j] = sum * sd * sd;
    }
  }
  return out;
}

/** A draw from N(mean, covariance). */
function draw(mean: Float64Array, covariance: Float64Array): Float64Array {
  const factor = covariance.slice();
  choleskyInPlace(factor, KEPT);
  const z = Array.from({ length: KEPT }, () => random.normal());
  return mean.map((m, i) => {
    let sum = m;
    for (let k = 0; k <= i; k++) sum += factor[i * KEPT + k]! * z[k]!;
    return sum;
  });
}

/** Kept numbers at their places in a whole fit. */
function asFit(mean: Float64Array, covariance: Float64Array) {
  const parameters = new Float64Array(PARAMETERS);
  const whole = new Float64Array(PARAMETERS * PARAMETERS);
  KEPT_PLACES.forEach((p, i) => {
    parameters[p] = mean[i]!;
    KEPT_PLACES.forEach((q, j) => {
      whole[p * PARAMETERS + q] = covariance[i * KEPT + j]!;
    });
  });
  return { parameters, covariance: whole };
}

describe('what is kept of a camera', () => {
  it('takes sensor, tone, matrix and departures out of a fit, and nothing of gains, veil, light or index', () => {
    expect(KEPT).toBe(18 + 3 * SENSOR_DEPARTURES);
    expect(KEPT_PLACES).toContain(AT.departure);
    for (const place of [AT.logGain, AT.veil, AT.index, AT.mired]) expect(KEPT_PLACES).not.toContain(place);
    const whole = {
      parameters: Float64Array.from({ length: PARAMETERS }, (_, p) => p),
      covariance: spread(PARAMETERS, 1),
    };
    const known = cameraKnowledge(whole);
    expect([...known.mean]).toEqual([...KEPT_PLACES]);
    expect(known.covariance[9 * KEPT + 17]).toBe(whole.covariance[AT.tone * PARAMETERS + AT.matrix + 5]);
  });

  it('as a prior, gives mean and covariance of the kept part, and leaves the rest of the prior as it was', () => {
    const known: CameraKnowledge = {
      mean: Float64Array.from({ length: KEPT }, () => random.normal()),
      covariance: spread(KEPT, 0.2),
    };
    const next = withCamera(prior, known);
    const covariance = inverseOf(next.precision, PARAMETERS);
    const before = inverseOf(prior.precision, PARAMETERS);
    KEPT_PLACES.forEach((p, i) => {
      expect(next.mean[p]).toBe(known.mean[i]);
      KEPT_PLACES.forEach((q, j) => {
        expect(covariance[p * PARAMETERS + q]).toBeCloseTo(known.covariance[i * KEPT + j]!, 10);
      });
    });
    for (const p of [AT.logGain, AT.logGain + 1, AT.veil, AT.index, AT.mired])
      for (const q of [AT.logGain, AT.logGain + 1, AT.veil, AT.index, AT.mired])
        expect(covariance[p * PARAMETERS + q]).toBeCloseTo(before[p * PARAMETERS + q]!, 10);
  });

  it('widens for the next photo as white balance errors before the matrix turn it', () => {
    // Against matrices turned by drawn errors, rows scaled back: the covariance of the difference of two such.
    const sd = 0.08;
    const turned = () => {
      const g = [0, 1, 2].map(() => 1 + sd * random.normal());
      const rows = [0, 1, 2].map((r) => {
        const row = [0, 1, 2].map((c) => MATRIX[3 * r + c]! * g[c]!);
        const sum = row[0]! + row[1]! + row[2]!;
        return row.map((v) => v / sum);
      });
      return [rows[0]![1]!, rows[0]![2]!, rows[1]![0]!, rows[1]![2]!, rows[2]![0]!, rows[2]![1]!];
    };
    const square = new Float64Array(6);
    const draws = 20_000;
    for (let k = 0; k < draws; k++) {
      const a = turned();
      const b = turned();
      for (let e = 0; e < 6; e++) square[e]! += (a[e]! - b[e]!) ** 2 / draws;
    }
    const next = atNextPhoto(
      { mean: new Float64Array(KEPT), covariance: new Float64Array(KEPT * KEPT) },
      MATRIX,
    );
    for (let e = 0; e < 6; e++) {
      const own = next.covariance[(12 + e) * (KEPT + 1)]! - 0.03 ** 2;
      // Errors of 8 % are not infinitely small: the first order is good to a tenth of the standard deviation.
      expect(Math.abs(Math.sqrt(own) - Math.sqrt(square[e]!))).toBeLessThan(
        0.1 * Math.sqrt(square[e]!) + 0.002,
      );
    }
  });
});

describe('noticing another camera', () => {
  it('has the published tail: chi-square tables, Abramowitz & Stegun 1964, table 26.8', () => {
    // Percentage points for 5, 10 and 20 degrees of freedom (from memory, common practice in any such table).
    const table: [number, number, number][] = [
      [5, 11.0705, 0.05],
      [5, 15.0863, 0.01],
      [10, 18.307, 0.05],
      [10, 29.588, 0.001],
      [20, 31.4104, 0.05],
      [20, 45.315, 0.001],
    ];
    for (const [degrees, chiSquare, tail] of table)
      expect(Math.abs(chiSquareTail(chiSquare, degrees) - tail)).toBeLessThan(
        0.001 * (tail > 0.002 ? 1 : 0.1),
      );
  });

  it('finds the same camera improbable as often as it should, and another camera nearly always', () => {
    const known: CameraKnowledge = { mean: new Float64Array(KEPT), covariance: spread(KEPT, 0.2) };
    // A photo that measures the camera with an error of half its kept spread.
    const noise = known.covariance.map((v) => v / 4);
    const gain = 1 / (1 + 1 / 4);
    const after = known.covariance.map((v) => v * (1 - gain));
    const readOf = (truth: Float64Array) =>
      asFit(
        draw(truth, noise).map((v) => gain * v),
        after,
      );
    let improbable = 0;
    let noticed = 0;
    for (let k = 0; k < 2000; k++) {
      const same = conflictWith(known, readOf(draw(known.mean, known.covariance)));
      if (same.probability < 0.05) improbable++;
      const other = draw(
        new Float64Array(KEPT),
        known.covariance.map((v) => v * 16),
      );
      if (conflictWith(known, readOf(other)).probability < 1e-3) noticed++;
    }
    // Binomial standard deviation 0.5 %.
    expect(improbable / 2000).toBeGreaterThan(0.03);
    expect(improbable / 2000).toBeLessThan(0.07);
    expect(noticed / 2000).toBeGreaterThan(0.95);
  });

  it('finds nothing where the photo tells nothing of the camera', () => {
    const known: CameraKnowledge = { mean: new Float64Array(KEPT), covariance: spread(KEPT, 0.2) };
    expect(conflictWith(known, asFit(known.mean, known.covariance)).probability).toBe(1);
  });
});
