import { describe, expect, it } from 'vitest';
import { daylightSpectrum } from '../../src/colour/light.ts';
import { cameraWeights } from '../../src/colour/photoCamera.ts';
import { SRGB } from '../../src/colour/rgb.ts';
import { FILM_WAVELENGTHS_NM } from '../../src/colour/sampled.ts';
import { sensorCurves } from '../../src/colour/sensorFamily.ts';
import { filmStackFor } from '../../src/optics/filmPresets.ts';
import { filmReflectance } from '../../src/optics/filmReflectance.ts';
import { withIndexShift } from '../../src/optics/withIndexShift.ts';
import { lightWeighted } from '../../src/scene/cameraMatrix.ts';
import { type EarlyDraws, filmTableOf } from '../../src/scene/conditions.ts';
import { developPhoto } from '../../src/scene/develop.ts';
import { seededRandom } from '../../src/scene/random.ts';
import { randomReflectances } from '../../src/scene/reflectances.ts';
import { sceneCamera } from '../../src/scene/sceneCamera.ts';

/** Raw values of one film from the exact Airy sum at every wavelength, with no table in between. */
function exactRaw(nm: number, incidenceRad: number, indexError: number, rawWeights: Float64Array): number[] {
  const plain = filmStackFor('diesel');
  const stack = { ...plain, film: withIndexShift(plain.film, indexError) };
  const n = FILM_WAVELENGTHS_NM.length;
  return [0, 1, 2].map((c) =>
    FILM_WAVELENGTHS_NM.reduce(
      (sum, nmLight, i) =>
        sum + rawWeights[c * n + i]! * filmReflectance(stack, nm, nmLight, incidenceRad, 'unpolarised'),
      0,
    ),
  );
}

const drawn: EarlyDraws = {
  sensor: 'family',
  coefficients: [0, 0, 0, 0, 0, 0, 0, 0, 0],
  gains: [1, 1, 1],
  gainStage: 'output',
  tone: { shape: 'none' },
  daylightK: 6500,
  toldDaylightK: 6500,
  indexError: 0.006,
  presetIndex: 1.465,
  incidenceDeg: 40,
  noiseCodes: 0,
  relativeThicknessSpread: 0,
  veilShare: [0, 0, 0],
  targetLevel: 0.7,
};
const camera = sceneCamera(drawn.coefficients, drawn.daylightK, seededRandom('camera'));

describe('the film table of the renderer', () => {
  it('is the exact reflectance through the sensor, between its nodes too, to 1e-4 of the brightest film', () => {
    const table = filmTableOf(filmStackFor('diesel'), drawn, camera, {
      maxNm: 1000,
      stepNm: 1,
      fromDeg: 30,
      toDeg: 80,
    });
    const out = new Float64Array(3);
    for (const deg of [30, 47.3, 61.6, 75.5, 80]) {
      const brightest = Math.max(...exactRaw(95, (deg * Math.PI) / 180, 0.006, camera.rawWeights));
      for (const nm of [0, 0.4, 33.3, 180.5, 407.7, 999.5]) {
        const incidenceRad = (deg * Math.PI) / 180;
        table.lookUp(nm, incidenceRad, out);
        exactRaw(nm, incidenceRad, 0.006, camera.rawWeights).forEach((value, c) => {
          expect(Math.abs(out[c]! - value) / brightest).toBeLessThan(1e-4);
        });
      }
    }
  });

  it('clamps thickness and angle to its range', () => {
    const table = filmTableOf(filmStackFor('diesel'), drawn, camera, {
      maxNm: 100,
      stepNm: 0.5,
      fromDeg: 40,
      toDeg: 40,
    });
    const [a, b] = [new Float64Array(3), new Float64Array(3)];
    table.lookUp(-5, 0.2, a);
    table.lookUp(0, 0.7, b);
    expect(a).toEqual(b);
  });

  it('fades with thickness spread inside a pixel', () => {
    const contrast = (relativeThicknessSpread: number) => {
      const table = filmTableOf(filmStackFor('diesel'), { ...drawn, relativeThicknessSpread }, camera, {
        maxNm: 1000,
        stepNm: 1,
        fromDeg: 40,
        toDeg: 40,
      });
      const levels = [];
      const out = new Float64Array(3);
      for (let nm = 600; nm < 900; nm += 5) {
        table.lookUp(nm, 0.7, out);
        levels.push(out[2]!);
      }
      return Math.max(...levels) - Math.min(...levels);
    };
    expect(contrast(0.06)).toBeLessThan(0.4 * contrast(0));
  });
});

describe('the camera of the renderer', () => {
  // A colour that a flat film should have by the reader's own photo camera: same sensor, another way round, and a matrix
  // fitted on other surfaces. White must agree exactly, colours within what two makers' matrices differ by.
  it('gives white (1, 1, 1) and film colours close to cameraWeights times reflectance', () => {
    const a = [0.4, -0.8, 0.3, 1.1, 0.2, -0.5, -0.9, 0.6, 0.1];
    const own = sceneCamera(a, 6500, seededRandom('other'));
    const n = FILM_WAVELENGTHS_NM.length;
    const { weights } = cameraWeights(a, { daylightK: 6500 }, SRGB, FILM_WAVELENGTHS_NM);
    const linear = (raw: number[], c: number) =>
      [0, 1, 2].reduce((sum, k) => sum + own.matrix[3 * c + k]! * raw[k]!, 0);
    for (let c = 0; c < 3; c++) {
      expect(linear([1, 1, 1], c)).toBeCloseTo(1, 12);
    }
    for (const nm of [60, 150, 240, 310, 480, 700]) {
      const raw = exactRaw(nm, 0.3, 0, own.rawWeights);
      for (let c = 0; c < 3; c++) {
        const theirs = FILM_WAVELENGTHS_NM.reduce(
          (sum, light, i) =>
            sum +
            weights[c * n + i]! * filmReflectance(filmStackFor('diesel'), nm, light, 0.3, 'unpolarised'),
          0,
        );
        expect(Math.abs(linear(raw, c) - theirs)).toBeLessThan(0.004);
      }
    }
  });

  it('weighs sensor curves by the light', () => {
    const a = [0, 0, 0, 0, 0, 0, 0, 0, 0];
    const expected = lightWeighted(
      sensorCurves(a, FILM_WAVELENGTHS_NM),
      daylightSpectrum(6500, FILM_WAVELENGTHS_NM),
    );
    expect(camera.rawWeights).toEqual(expected);
  });

  it('fits its matrix on spectra within 0 and 1 that span the colours', () => {
    const spectra = randomReflectances(FILM_WAVELENGTHS_NM, 60, seededRandom('spectra'));
    expect(Math.min(...spectra)).toBeGreaterThan(0);
    expect(Math.max(...spectra)).toBeLessThan(1);
  });
});

describe('a flat film', () => {
  it('comes out as one colour with the stated noise', () => {
    const raw = new Float32Array(3 * 20_000);
    const colour = exactRaw(310, 0.2, 0, camera.rawWeights);
    for (let i = 0; i < raw.length; i++) {
      raw[i] = colour[i % 3]!;
    }
    const development = {
      matrix: camera.matrix,
      exposure: 10,
      veil: [0, 0, 0] as const,
      tone: { shape: 'none' } as const,
      noiseCodes: 2,
    };
    const codes = developPhoto(raw, development, seededRandom('flat'));
    for (let c = 0; c < 3; c++) {
      const linear = 10 * [0, 1, 2].reduce((sum, k) => sum + camera.matrix[3 * c + k]! * colour[k]!, 0);
      let sum = 0;
      for (let i = c; i < codes.length; i += 3) {
        sum += codes[i]!;
      }
      expect(Math.abs(sum / 20_000 - 255 * SRGB.encode(linear))).toBeLessThan((5 * 2.03) / Math.sqrt(20_000));
    }
  });
});
