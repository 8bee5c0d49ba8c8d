/** A camera before a soap film, for tests: the forward model of the fit at a nanometre step or two. */
import { matrixMaker } from '../../src/colour/cameraMatrix.ts';
import { SRGB } from '../../src/colour/rgb.ts';
import { FILM_WAVELENGTHS_NM } from '../../src/colour/sampled.ts';
import type { CameraModel } from '../../src/match/cameraModel.ts';
import { type FilmScene, filmBasis } from '../../src/match/filmBasis.ts';
import type { CameraFit } from '../../src/match/fitCamera.ts';
import { AT, PARAMETERS } from '../../src/match/parameters.ts';
import { SHARP } from '../../src/optics/blur.ts';
import { filmStackFor } from '../../src/optics/filmPresets.ts';

export const SOAP_SCENE: FilmScene = {
  stack: filmStackFor('soap'),
  incidenceRad: 0.2,
  polarisation: 'unpolarised',
  blur: SHARP,
};

export function soapModel(stepNm: number, toNm: number): CameraModel {
  const light = { daylightK: 6500 };
  return {
    basis: filmBasis(SOAP_SCENE, light, stepNm, Math.round(toNm / stepNm) + 1, FILM_WAVELENGTHS_NM),
    encoding: SRGB,
    matrixFor: matrixMaker(light, SRGB, FILM_WAVELENGTHS_NM).matrixFor,
  };
}

/** An exposure that puts the brightest band at about 200 of 255 codes, a trace of flare, a mild S curve. */
export function plausibleParameters(): Float64Array {
  const parameters = new Float64Array(PARAMETERS);
  parameters.set([1.62, 1.58, 1.66], AT.logGain);
  parameters.set([0.012, 0.015, 0.018], AT.veil);
  parameters[AT.tone] = 0.1;
  return parameters;
}

/** A finished fit at `parameters` that leaves open what `covariance` says (nothing, when absent). */
export function fitAt(parameters: Float64Array, covariance?: Float64Array): CameraFit {
  return {
    parameters,
    covariance: covariance ?? new Float64Array(PARAMETERS * PARAMETERS),
    residualCodes: 0,
    objective: 0,
    filmShare: 1,
    sampleNm: new Float64Array(0),
  };
}
