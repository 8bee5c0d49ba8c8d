import type { FilmScene } from '../match/filmBasis.ts';
import { isOilOnWater } from '../optics/filmPresets.ts';
import type { Notice } from './contract.ts';
import type { PhotoView } from './photoView.ts';
import type { Setup } from './setup.ts';

/** An angle of view that a set-up does not give: what is taken, and what that leaves open. */
export interface AssumedIncidence {
  readonly incidenceRad: number;
  /** Of thickness, one standard deviation, shared by all pixels. */
  readonly relativeSd: number;
  readonly notices: readonly Notice[];
}

const DEGREE = Math.PI / 180;
/**
 * Oil on water without a stated angle: anywhere from straight down to 60 degrees, all alike, read as at 35 degrees, in
 * whose middle the thicknesses of that range lie. Other films are set up to be looked at: frontal, give or take 10
 * degrees. Common practice, not published.
 */
const OIL = { toDeg: 60, readAtDeg: 35 } as const;
const FRONTAL_SD_DEG = 10;
/** Straight down without a focal length: the corners of a phone's photo look 39 degrees aside. */
const DOWN_TO_DEG = 39;

/**
 * What to take for the angle of view where neither it nor a view is given. A colour fixes thickness times
 * sqrt(n^2 - sin^2 i), so an angle that is not known mostly scales thickness.
 * @returns null where the set-up says enough
 */
export function assumedIncidence(
  setup: Setup,
  photoView: PhotoView | null,
  scene: FilmScene,
): AssumedIncidence | null {
  if (photoView?.view) return null;
  if (photoView) {
    return { incidenceRad: 0, relativeSd: spreadOver(scene, 0, uniform(DOWN_TO_DEG)), notices: [] };
  }
  if (setup.incidenceDeg !== undefined) return null;
  const oil = typeof setup.film === 'string' && isOilOnWater(setup.film);
  const incidenceRad = oil ? OIL.readAtDeg * DEGREE : 0;
  const relativeSd = spreadOver(scene, incidenceRad, oil ? uniform(OIL.toDeg) : normal(FRONTAL_SD_DEG));
  const percent = Math.max(1, Math.round(100 * relativeSd));
  const text = oil
    ? `The angle of view is not given, so 35° from the vertical is assumed, which leaves thickness open by about ${percent} %: give the height, the horizon and the focal length, or the angle.`
    : `The angle of view is not given, so a frontal view is assumed, which leaves thickness open by about ${percent} %: give the angle.`;
  return { incidenceRad, relativeSd, notices: [{ code: 'incidence-assumed', text }] };
}

/** Root mean square of the relative change of thickness over angles, about reading at one. */
function spreadOver(scene: FilmScene, readAtRad: number, angles: readonly number[]): number {
  const n = scene.stack.film.refractiveIndex(PATH_WAVELENGTH_NM);
  const root = (angle: number) => {
    const sine = scene.stack.ambient.refractiveIndex(PATH_WAVELENGTH_NM) * Math.sin(angle);
    return Math.sqrt(Math.max(0.01, n * n - sine * sine));
  };
  const squares = angles.reduce((sum, angle) => sum + (root(readAtRad) / root(angle) - 1) ** 2, 0);
  return Math.sqrt(squares / angles.length);
}

const PATH_WAVELENGTH_NM = 550;
const PARTS = 101;

function uniform(toDeg: number): number[] {
  return Array.from({ length: PARTS }, (_, k) => ((k + 0.5) / PARTS) * toDeg * DEGREE);
}

/** Quantiles of a folded normal distribution, by the logistic that comes near it (1.702). */
function normal(sdDeg: number): number[] {
  return Array.from({ length: PARTS }, (_, k) => {
    const share = (k + 0.5) / PARTS;
    return Math.abs((sdDeg * DEGREE * Math.log(share / (1 - share))) / 1.702);
  });
}
