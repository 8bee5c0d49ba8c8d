import { wavelengths } from '../colour/sampled.ts';
import type { RgbEncoding } from '../colour/types.ts';
import { type AngleBasis, angleBasis, bareRow, stackBases } from '../match/angleBasis.ts';
import type { FilmBasis, FilmScene } from '../match/filmBasis.ts';
import type { FilmSample } from '../match/sampleFilm.ts';
import type { Blur } from '../optics/types.ts';
import { incidenceDistribution } from '../view/incidenceDistribution.ts';
import type { PoseDraw } from '../view/poseDraws.ts';
import { slopeVariance, slopeVarianceInsidePixel } from '../view/seaSlope.ts';
import { type AnglePlan, incidenceSdRad, pixelOnWaterM } from './anglePlan.ts';

/** The optics of a photo whose pixels look at different angles. */
export interface SlantedOptics {
  readonly plan: AnglePlan;
  /** Rows of one angle after the other, for one fit over all strips. */
  readonly fitBasis: FilmBasis;
  /** Row of `fitBasis` for bare surface at the angle where it is marked. */
  readonly bareRow: number;
  readonly sceneAt: (incidenceRad: number) => FilmScene;
  readonly basisAt: (incidenceRad: number) => FilmBasis;
  /** Relative standard deviation of thickness from what is not known of the angle. */
  readonly relativeSdAt: (incidenceRad: number) => number;
  /** Relative standard deviation of a film's brightness from the same. */
  readonly brightnessSdAt: (incidenceRad: number) => number;
  /** The sample with its colours brought to the middle of their strips, and the strip of each. */
  readonly place: (sample: FilmSample, encoding: RgbEncoding) => PlacedSample;
}

export interface PlacedSample {
  readonly sample: FilmSample;
  /** Rows of `fitBasis` that each sample may take, as [from, to) pairs: those of its strip. */
  readonly allowed: Uint32Array;
  /** Rows of one strip, and the first of each sample's. */
  readonly rows: number;
  /** Thickness in its strip for thickness at the sample. */
  readonly scale: Float64Array;
}

/** Steps of the bases between which angles are interpolated. Fringes up to 1500 nm are 37 nm wide and more. */
export const SLANTED_STEP_NM = 2;
const WAVELENGTH_STEPS_NM = [
  { upToNm: 1600, stepNm: 5 },
  { upToNm: 3500, stepNm: 2 },
  { upToNm: Number.POSITIVE_INFINITY, stepNm: 1 },
] as const;
/** Wavelength at which a colour's phase is counted, as everywhere in the match. */
const PATH_WAVELENGTH_NM = 550;
/** Angles that stand for the waves inside a pixel. */
const WAVE_NODES = 5;

/**
 * Works out the bases of a slanted photo.
 * @param make computes one basis; angle and blur are in the scene
 * @param fitMaxNm thickest film of the fit
 * @param cleanRad angle at which bare surface is marked; null where none is
 * @param windMS wind, whose waves spread the angle; null for smooth water
 */
export function slantedOptics(
  plan: AnglePlan,
  poses: PoseDraw | null,
  scene: FilmScene,
  make: (scene: FilmScene, stepNm: number, count: number, wavelengthNm: Float64Array) => FilmBasis,
  maxNm: number,
  fitMaxNm: number,
  cleanRad: number | null,
  windMS: number | null,
): SlantedOptics {
  const count = Math.ceil(maxNm / SLANTED_STEP_NM) + 1;
  const fitCount = Math.min(count, Math.ceil(fitMaxNm / SLANTED_STEP_NM) + 1);
  const grid = wavelengths(380, 780, WAVELENGTH_STEPS_NM.find(({ upToNm }) => maxNm <= upToNm)!.stepNm);
  const { chartRad, fitRad } = plan;
  const sceneAt = (incidenceRad: number): FilmScene => ({
    ...scene,
    incidenceRad,
    blur: windMS === null ? scene.blur : waveBlur(plan, scene.blur, incidenceRad, windMS),
  });
  const computed = (incidenceRad: number) => make(sceneAt(incidenceRad), SLANTED_STEP_NM, count, grid);
  const angleSd = (incidenceRad: number) =>
    Math.hypot(poses ? incidenceSdRad(plan, poses, incidenceRad) : 0, waveTiltSd(plan, incidenceRad, windMS));
  const from = Math.min(chartRad[0]!, cleanRad ?? Number.POSITIVE_INFINITY);
  const to = Math.max(chartRad[chartRad.length - 1]!, cleanRad ?? 0);
  const bases: AngleBasis = angleBasis(computed, from, to);
  const strips = Array.from(fitRad, (angle) => firstRows(bases.at(angle), fitCount));
  return {
    plan,
    fitBasis: stackBases(strips, bareRow(bases.at(cleanRad ?? plan.referenceRad))),
    bareRow: strips.length * fitCount,
    sceneAt,
    basisAt: bases.at,
    relativeSdAt: (incidenceRad) => perAngle(scene, incidenceRad) * angleSd(incidenceRad),
    brightnessSdAt: (incidenceRad) => brighterPerAngle(plan, incidenceRad) * angleSd(incidenceRad),
    place: (sample, encoding) => placeSample(plan, scene, sample, encoding, fitCount),
  };
}

function firstRows(basis: FilmBasis, count: number): FilmBasis {
  const row = basis.table.length / basis.count;
  return {
    ...basis,
    count,
    table: basis.table.subarray(0, count * row),
    perIndex: basis.perIndex.subarray(0, count * row),
    perMired: basis.perMired.subarray(0, count * row),
  };
}

/** Relative change of thickness a radian of incidence: d sqrt(n^2 - sin^2 i) is what a colour fixes. */
function perAngle(scene: FilmScene, incidenceRad: number): number {
  const n = scene.stack.film.refractiveIndex(PATH_WAVELENGTH_NM);
  const ambient = scene.stack.ambient.refractiveIndex(PATH_WAVELENGTH_NM);
  const sine = ambient * Math.sin(incidenceRad);
  return (ambient * sine * Math.cos(incidenceRad)) / (n * n - sine * sine);
}

/** Relative change of a film's brightness a radian of incidence. */
function brighterPerAngle({ brightness }: AnglePlan, incidenceRad: number): number {
  const step = Math.PI / 180;
  return Math.log(brightness(incidenceRad + step) / brightness(incidenceRad)) / step;
}

function waveBlur(plan: AnglePlan, blur: Blur, incidenceRad: number, windMS: number): Blur {
  const inside = slopeVarianceInsidePixel(
    slopeVariance(windMS, 'slick').total,
    pixelOnWaterM(plan, incidenceRad),
    windMS,
    'slick',
  );
  return { ...blur, incidence: incidenceDistribution(incidenceRad, inside, WAVE_NODES) };
}

/**
 * Slope of the water along the line of sight that is allowed for where no wind is given, one standard deviation: the
 * swing of sheltered water. A judgement, without a source; a sixth of what Cox & Munk's slick has at no wind.
 */
const CALM_TILT_RAD = 0.01;

/** Waves longer than a pixel tilt it as a whole: an angle that is not known, one standard deviation in radians. */
function waveTiltSd(plan: AnglePlan, incidenceRad: number, windMS: number | null): number {
  if (windMS === null) return CALM_TILT_RAD;
  const { total } = slopeVariance(windMS, 'slick');
  const inside = slopeVarianceInsidePixel(total, pixelOnWaterM(plan, incidenceRad), windMS, 'slick');
  return Math.sqrt(Math.max(0, total - inside) / 2);
}

/** Assigns samples to strips and brings their brightness to that of the strip's middle. */
function placeSample(
  plan: AnglePlan,
  scene: FilmScene,
  sample: FilmSample,
  encoding: RgbEncoding,
  rows: number,
): PlacedSample {
  const { fitRad, brightness, cosineAt } = plan;
  const n = scene.stack.film.refractiveIndex(PATH_WAVELENGTH_NM);
  const ambient = scene.stack.ambient.refractiveIndex(PATH_WAVELENGTH_NM);
  const root = (angle: number) => Math.sqrt(n * n - (ambient * Math.sin(angle)) ** 2);
  const codes = sample.codes.slice();
  const allowed = new Uint32Array(2 * sample.count);
  const scale = new Float64Array(sample.count);
  for (let i = 0; i < sample.count; i++) {
    const angle = Math.acos(Math.min(1, cosineAt(sample.at[2 * i]!, sample.at[2 * i + 1]!)));
    let strip = 0;
    for (let k = 1; k < fitRad.length; k++) {
      if (Math.abs(fitRad[k]! - angle) < Math.abs(fitRad[strip]! - angle)) strip = k;
    }
    const ratio = brightness(fitRad[strip]!) / brightness(angle);
    for (let c = 0; c < 3; c++) {
      const linear = encoding.decode(Math.max(0, codes[3 * i + c]!) / 255);
      codes[3 * i + c] = 255 * encoding.encode(Math.min(1, linear * ratio));
    }
    allowed[2 * i] = strip * rows;
    allowed[2 * i + 1] = (strip + 1) * rows;
    scale[i] = root(angle) / root(fitRad[strip]!);
  }
  return { sample: { ...sample, codes }, allowed, rows, scale };
}
