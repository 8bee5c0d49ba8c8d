import { describe, expect, it } from 'vitest';
import { applyWeights } from '../../src/colour/applyWeights.ts';
import { matrixMaker } from '../../src/colour/cameraMatrix.ts';
import { cameraWeights } from '../../src/colour/photoCamera.ts';
import { SRGB } from '../../src/colour/rgb.ts';
import { FILM_WAVELENGTHS_NM } from '../../src/colour/sampled.ts';
import { type CameraModel, modelEvaluator } from '../../src/match/cameraModel.ts';
import { type FilmScene, filmBasis } from '../../src/match/filmBasis.ts';
import { AT, PARAMETER_NAMES, PARAMETERS } from '../../src/match/parameters.ts';
import { toneOf, toneSlope } from '../../src/match/toneCurve.ts';
import { SHARP } from '../../src/optics/blur.ts';
import { filmStackFor } from '../../src/optics/filmPresets.ts';
import { reflectanceTable } from '../../src/optics/reflectanceTable.ts';
import { withIndexShift } from '../../src/optics/withIndexShift.ts';

const scene: FilmScene = {
  stack: filmStackFor('diesel'),
  incidenceRad: 0.4,
  polarisation: 'unpolarised',
  blur: SHARP,
};
const light = { daylightK: 6800 };
const model: CameraModel = {
  basis: filmBasis(scene, light, 5, 161, FILM_WAVELENGTHS_NM),
  encoding: SRGB,
  matrixFor: matrixMaker(light, SRGB, FILM_WAVELENGTHS_NM).matrixFor,
};

function someParameters(): Float64Array {
  const p = new Float64Array(PARAMETERS);
  p.set([0.4, -0.7, 0.3, 0.8, 0.2, -0.5, -0.3, 0.6, 0.1], AT.sensor);
  p.set([2.2, 2.1, 2.3], AT.logGain);
  p.set([0.01, 0.02, 0.015], AT.veil);
  p.set([0.15, -0.05, 0.02], AT.tone);
  p[AT.index] = 0.004;
  p[AT.mired] = 8;
  p.set([-0.05, 0.04, 0.02, -0.03, 0.01, -0.06], AT.matrix);
  return p;
}

describe('camera model', () => {
  it('gives the codes of the plain forward sum when nothing departs from the nominal camera', () => {
    const evaluator = modelEvaluator(model);
    const parameters = new Float64Array(PARAMETERS);
    parameters.fill(2, AT.logGain, AT.logGain + 3);
    evaluator.moveTo(parameters, false);
    const weights = cameraWeights(new Float64Array(9), light, SRGB, FILM_WAVELENGTHS_NM);
    const table = reflectanceTable(scene.stack, {
      thicknessNm: Float64Array.from({ length: 161 }, (_, j) => 5 * j),
      wavelengthNm: FILM_WAVELENGTHS_NM,
      incidenceRad: scene.incidenceRad,
      polarisation: 'unpolarised',
    });
    const linear = applyWeights(weights, table);
    const out = new Float64Array(3);
    for (const j of [0, 17, 60, 160]) {
      evaluator.codesAt(j, out, 0);
      for (let c = 0; c < 3; c++) {
        const expected = 255 * SRGB.encode(Math.min(1, Math.max(0, Math.exp(2) * linear[3 * j + c]!)));
        expect(out[c]!).toBeCloseTo(expected, 6);
      }
    }
  });

  it('has the derivatives that finite differences give, all 26 of them', () => {
    const evaluator = modelEvaluator(model);
    const parameters = someParameters();
    const jacobian = new Float64Array(3 * PARAMETERS);
    const up = new Float64Array(3);
    const down = new Float64Array(3);
    for (const j of [0, 23, 77, 140]) {
      evaluator.moveTo(parameters, true);
      evaluator.jacobianAt(j, jacobian);
      for (let p = 0; p < PARAMETERS; p++) {
        // The matrix derivative is itself a difference over 0.05 standard deviations; the others are exact.
        const h = p < 9 ? 0.05 : 1e-5;
        const moved = parameters.slice();
        moved[p]! += h;
        evaluator.moveTo(moved, false);
        evaluator.codesAt(j, up, 0);
        moved[p]! -= 2 * h;
        evaluator.moveTo(moved, false);
        evaluator.codesAt(j, down, 0);
        for (let c = 0; c < 3; c++) {
          const numeric = (up[c]! - down[c]!) / (2 * h);
          const tolerance = p < 9 ? 0.02 + 0.03 * Math.abs(numeric) : 1e-3 + 1e-4 * Math.abs(numeric);
          expect(
            Math.abs(jacobian[c * PARAMETERS + p]! - numeric),
            `${PARAMETER_NAMES[p]}, row ${j}`,
          ).toBeLessThan(tolerance);
        }
      }
    }
  });

  it('keeps colours within a code when the index shifts at a fixed optical path, as its linear term says', () => {
    const shift = 0.008;
    const ratio = 1.465 / (1.465 + shift);
    const weights = cameraWeights(new Float64Array(9), light, SRGB, FILM_WAVELENGTHS_NM);
    const flat: FilmScene = { ...scene, incidenceRad: 0 };
    const basis = filmBasis(flat, light, 5, 161, FILM_WAVELENGTHS_NM);
    const evaluator = modelEvaluator({ ...model, basis });
    const parameters = new Float64Array(PARAMETERS);
    parameters.fill(2.3, AT.logGain, AT.logGain + 3);
    parameters[AT.index] = shift;
    evaluator.moveTo(parameters, false);
    const exact = applyWeights(
      weights,
      reflectanceTable(
        { ...flat.stack, film: withIndexShift(flat.stack.film, shift) },
        {
          thicknessNm: Float64Array.from({ length: 161 }, (_, j) => 5 * j * ratio),
          wavelengthNm: FILM_WAVELENGTHS_NM,
          incidenceRad: 0,
          polarisation: 'unpolarised',
        },
      ),
    );
    const out = new Float64Array(3);
    let worst = 0;
    for (let j = 0; j < 161; j++) {
      evaluator.codesAt(j, out, 0);
      for (let c = 0; c < 3; c++) {
        worst = Math.max(
          worst,
          Math.abs(out[c]! - 255 * SRGB.encode(Math.min(1, Math.max(0, Math.exp(2.3) * exact[3 * j + c]!)))),
        );
      }
    }
    expect(worst).toBeLessThan(1);
  });

  it('has a tone curve that keeps black and white, with the slope that differences give', () => {
    const k = Float64Array.of(0.2, -0.08, 0.04);
    expect(toneOf(0, k, 0)).toBe(0);
    expect(toneOf(1, k, 0)).toBeCloseTo(1, 12);
    for (const e of [0.1, 0.35, 0.5, 0.8]) {
      expect(toneSlope(e, k, 0)).toBeCloseTo((toneOf(e + 1e-6, k, 0) - toneOf(e - 1e-6, k, 0)) / 2e-6, 6);
    }
  });
});
