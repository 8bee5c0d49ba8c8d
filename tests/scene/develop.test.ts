import { clampRgb, converter } from 'culori';
import { describe, expect, it } from 'vitest';
import { fitCameraMatrix, lightWeighted, rawResponses } from '../../src/scene/cameraMatrix.ts';
import { codesOfRaw, type Development, developPhoto } from '../../src/scene/develop.ts';
import { seededRandom } from '../../src/scene/random.ts';
import { drawFilmic, drawSigmoid, toneFunction } from '../../src/scene/toneCurve.ts';

const IDENTITY = Float64Array.of(1, 0, 0, 0, 1, 0, 0, 0, 1);
const plain: Development = {
  matrix: IDENTITY,
  exposure: 1,
  veil: [0, 0, 0],
  tone: { shape: 'none' },
  noiseCodes: 0,
};

describe('developing', () => {
  it('encodes linear light as culori does (sRGB)', () => {
    const toRgb = converter('rgb');
    for (const level of [0, 0.0005, 0.0031308, 0.02, 0.18, 0.5, 0.93, 1]) {
      const { r } = clampRgb(toRgb({ mode: 'lrgb', r: level, g: level, b: level }));
      expect(codesOfRaw([level, level, level], plain)[0] / 255).toBeCloseTo(r, 6);
    }
  });

  it('applies matrix, exposure and veil on linear light, in that order', () => {
    const development = {
      ...plain,
      matrix: Float64Array.of(1.5, -0.4, -0.1, 0, 1, 0, 0, 0, 1),
      exposure: 2,
      veil: [0.01, 0, 0.02] as const,
    };
    const [r, g, b] = codesOfRaw([0.2, 0.1, 0.05], development);
    const [er, eg, eb] = codesOfRaw([2 * (0.3 - 0.04 - 0.005) + 0.01, 0.2, 0.12], plain);
    expect(r).toBeCloseTo(er, 9);
    expect(g).toBeCloseTo(eg, 9);
    expect(b).toBeCloseTo(eb, 9);
  });

  it('adds noise of the stated size, channel by channel', () => {
    const count = 60_000;
    const raw = new Float32Array(3 * count).fill(0.21);
    const codes = developPhoto(raw, { ...plain, noiseCodes: 2 }, seededRandom('noise'));
    const centre = codesOfRaw([0.21, 0.21, 0.21], plain)[0];
    const product = [0, 0];
    for (let c = 0; c < 3; c++) {
      let [sum, squares] = [0, 0];
      for (let i = 0; i < count; i++) {
        const off = codes[3 * i + c]! - centre;
        sum += off;
        squares += off * off;
        if (c === 1) {
          product[0]! += off * (codes[3 * i]! - centre);
          product[1]!++;
        }
      }
      // Rounding to whole codes adds 1/12 to the variance of 4; five standard errors.
      expect(Math.abs(sum / count)).toBeLessThan(5 * (2.03 / Math.sqrt(count)));
      expect(Math.abs(squares / count / (4 + 1 / 12) - 1)).toBeLessThan(5 * Math.sqrt(2 / count));
    }
    expect(Math.abs(product[0]! / product[1]!)).toBeLessThan(5 * (4.1 / Math.sqrt(count)));
  });

  it('clips at 0 and 255 and repeats for the same seed', () => {
    const raw = Float32Array.of(0, 0, 0, 3, 3, 3);
    const develop = () => developPhoto(raw, { ...plain, noiseCodes: 2 }, seededRandom(3));
    expect(develop()).toEqual(develop());
    expect(Math.min(...develop().slice(0, 3))).toBeLessThan(6);
    expect(Math.min(...develop().slice(3))).toBeGreaterThan(249);
  });
});

describe('tone curves', () => {
  it('keep black and white and rise all the way, whatever was drawn', () => {
    const random = seededRandom('tones');
    for (let draw = 0; draw < 40; draw++) {
      for (const curve of [drawSigmoid(random), drawFilmic(random)]) {
        const tone = toneFunction(curve);
        expect(tone(0)).toBeCloseTo(0, 12);
        expect(tone(1)).toBeCloseTo(1, 12);
        for (let e = 0.01; e <= 1; e += 0.01) {
          expect(tone(e)).toBeGreaterThan(tone(e - 0.01));
        }
      }
    }
  });

  it('the sigmoid is y = e + 2k e(1-e)(2e-1), the filmic curve is not symmetric', () => {
    const sigmoid = toneFunction({ shape: 'sigmoid', strength: 0.3 });
    expect(sigmoid(0.25)).toBeCloseTo(0.25 + 0.6 * 0.25 * 0.75 * -0.5, 12);
    expect(sigmoid(0.8) - 0.8).toBeCloseTo(0.2 - sigmoid(0.2), 12);
    const filmic = toneFunction({ shape: 'filmic', gamma: 1, steepness: 3, centre: 0.4 });
    expect(Math.abs(filmic(0.8) - 0.8 - (0.2 - filmic(0.2)))).toBeGreaterThan(0.02);
  });
});

describe('the in-camera matrix', () => {
  it('finds the matrix that made the wanted colours, white kept', () => {
    const truth = [1.6, -0.5, -0.1, -0.2, 1.5, -0.3, 0.05, -0.45, 1.4];
    const random = seededRandom('matrix');
    const raw = Float64Array.from({ length: 90 }, () => random.next());
    const wanted = new Float64Array(90);
    for (let i = 0; i < 30; i++) {
      for (let c = 0; c < 3; c++) {
        wanted[3 * i + c] = [0, 1, 2].reduce((sum, k) => sum + truth[3 * c + k]! * raw[3 * i + k]!, 0);
      }
    }
    const fitted = fitCameraMatrix(raw, wanted);
    fitted.forEach((value, i) => {
      expect(value).toBeCloseTo(truth[i]!, 10);
    });
  });

  it('refuses colours that are all alike', () => {
    expect(() => fitCameraMatrix(new Float64Array(9).fill(0.5), new Float64Array(9).fill(0.5))).toThrow(
      /alike/,
    );
  });

  it('gives white for a perfect reflector', () => {
    const weights = lightWeighted(Float64Array.of(1, 2, 3, 1, 1, 1, 4, 0, 0), [0.5, 1, 2]);
    expect([...rawResponses(Float64Array.of(1, 1, 1), weights)].map((v) => v.toFixed(12))).toEqual(
      Array(3).fill('1.000000000000'),
    );
  });
});
