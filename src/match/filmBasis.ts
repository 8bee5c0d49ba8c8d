import { applyRows } from '../colour/applyWeights.ts';
import { DAYLIGHT_RANGE_K } from '../colour/light.ts';
import { BASIS_ROWS, cameraBasis } from '../colour/photoCamera.ts';
import type { Light } from '../colour/types.ts';
import { blurredReflectanceTable } from '../optics/blur.ts';
import type { Blur, FilmStack, Polarisation } from '../optics/types.ts';
import { withIndexShift } from '../optics/withIndexShift.ts';

/** The optical side of a set-up: everything that fixes the reflectance. */
export interface FilmScene {
  readonly stack: FilmStack;
  readonly incidenceRad: number;
  readonly polarisation: Polarisation;
  readonly blur: Blur;
}

/** Components of one sensor channel: the family's mean, its three principal components, departures from the family. */
export const COMPONENTS = BASIS_ROWS;
/** Channels times components: the length of one row of a basis table. */
export const ROW = 3 * COMPONENTS;

/**
 * What each sensor component records of the film, thickness by thickness, and how that changes with the two things
 * a set-up does not know exactly. Rows are [r0 r1 .. g0 g1 .. b0 b1 ..]; component 0 is the family's mean.
 *
 * Thickness here is *nominal*: the thickness that the nominal index at the nominal angle would need for the same
 * optical path. An index shift at a fixed path changes contrast only, so `perIndex` is small and close to linear.
 */
export interface FilmBasis {
  readonly stepNm: number;
  readonly count: number;
  /** Rows of one angle, where the bases of several angles are stacked (`stackBases`); `count` where left out. */
  readonly rowsPerAngle?: number;
  readonly table: Float64Array;
  readonly perIndex: Float64Array;
  /** Per mired (10^6 / K) of the light's correlated colour temperature; zero for a lamp. */
  readonly perMired: Float64Array;
  /** The rows of a perfect white reflector, which normalise each channel. */
  readonly white: Float64Array;
  readonly whitePerMired: Float64Array;
}

/** Step of the index derivative; the second difference over it is below 1 % of the first. */
const INDEX_STEP = 0.01;
/** Step of the light derivative, mired. */
const MIRED_STEP = 3;
/** Where nominal and true optical path are made equal, nm. */
const PATH_WAVELENGTH_NM = 550;

/** Thickness for nominal thickness when the film index is off by `shift`: the same optical path at 550 nm. */
export function pathRatio(scene: FilmScene, shift: number): number {
  const n = scene.stack.film.refractiveIndex(PATH_WAVELENGTH_NM);
  const sine = scene.stack.ambient.refractiveIndex(PATH_WAVELENGTH_NM) * Math.sin(scene.incidenceRad);
  return Math.sqrt((n * n - sine * sine) / ((n + shift) ** 2 - sine * sine));
}

/**
 * Computes the basis of a set-up for nominal thicknesses 0, step, 2 step ...
 * @throws RangeError for an angle or light outside their range
 */
export function filmBasis(
  scene: FilmScene,
  light: Light,
  stepNm: number,
  count: number,
  wavelengthNm: Float64Array,
): FilmBasis {
  const thicknessNm = Float64Array.from({ length: count }, (_, j) => j * stepNm);
  const project = (rows: Float64Array, table: Float64Array) =>
    applyRows(rows, ROW, wavelengthNm.length, table);
  const reflect = (shift: number) => {
    const ratio = pathRatio(scene, shift);
    return blurredReflectanceTable(
      { ...scene.stack, film: withIndexShift(scene.stack.film, shift) },
      {
        thicknessNm: thicknessNm.map((d) => d * ratio),
        wavelengthNm,
        incidenceRad: scene.incidenceRad,
        polarisation: scene.polarisation,
      },
      scene.blur,
    );
  };
  const nominal = reflect(0);
  const rows = cameraBasis(light, wavelengthNm);
  const table = project(rows, nominal);
  const above = project(rows, reflect(INDEX_STEP));
  const below = project(rows, reflect(-INDEX_STEP));
  const white = sumRows(rows);
  const perIndex = above.map((v, i) => (v - below[i]!) / (2 * INDEX_STEP));
  const neighbours = miredNeighbours(light);
  if (!neighbours) {
    return {
      stepNm,
      count,
      table,
      perIndex,
      perMired: new Float64Array(table.length),
      white,
      whitePerMired: new Float64Array(ROW),
    };
  }
  const [cooler, warmer] = neighbours.map((k) => cameraBasis({ daylightK: k }, wavelengthNm));
  const span = 1e6 / neighbours[1] - 1e6 / neighbours[0];
  const perRow = warmer!.map((v, i) => (v - cooler![i]!) / span);
  return {
    stepNm,
    count,
    table,
    perIndex,
    perMired: project(perRow, nominal),
    white,
    whitePerMired: sumRows(perRow),
  };
}

/** Every n-th row of a basis, the first `count` of them: the same optics at a coarser step. */
export function thinnedBasis(basis: FilmBasis, n: number, count: number): FilmBasis {
  const thin = (table: Float64Array) => {
    const out = new Float64Array(count * ROW);
    for (let j = 0; j < count; j++) out.set(table.subarray(j * n * ROW, (j * n + 1) * ROW), j * ROW);
    return out;
  };
  return {
    ...basis,
    stepNm: basis.stepNm * n,
    count,
    table: thin(basis.table),
    perIndex: thin(basis.perIndex),
    perMired: thin(basis.perMired),
  };
}

/** Temperatures a few mired to either side of a daylight, within the locus; null for a lamp. */
export function miredNeighbours(light: Light): readonly [number, number] | null {
  if (!('daylightK' in light)) return null;
  const mired = 1e6 / light.daylightK;
  const coolest = Math.max(1e6 / DAYLIGHT_RANGE_K[1], mired - MIRED_STEP);
  const warmest = Math.min(1e6 / DAYLIGHT_RANGE_K[0], mired + MIRED_STEP);
  return [1e6 / coolest, 1e6 / warmest];
}

/** Sums of a basis' rows over wavelength: what a perfect white gives. */
export function sumRows(rows: Float64Array): Float64Array {
  const n = rows.length / ROW;
  return Float64Array.from({ length: ROW }, (_, row) => {
    let sum = 0;
    for (let i = 0; i < n; i++) sum += rows[row * n + i]!;
    return sum;
  });
}
