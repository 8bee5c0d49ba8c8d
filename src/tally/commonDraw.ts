import { type AreaCells, lookFromCells, newCellView } from '../view/areaCells.ts';
import type { PoseDraw } from '../view/poseDraws.ts';
import { WARNING_RAD } from '../view/viewLimits.ts';
import type { WaterView } from '../view/waterView.ts';
import type { RandomNumbers } from './monteCarlo.ts';

/**
 * One trial's error that all pixels share: writes, for each cell, by how much area and thickness differ from the
 * nominal ones (1 where they do not).
 */
export type CommonDraw = (
  random: RandomNumbers,
  areaFactor: Float64Array,
  thicknessFactor: Float64Array,
) => void;

/** Refractive index of the film and one standard deviation of it. */
export interface FilmIndex {
  readonly index: number;
  readonly indexSd: number;
}

/**
 * Past this angle a drawn view counts as seen at it: areas run to infinity at the horizon, and a single trial must not
 * decide the interval. Pixels beyond 75 degrees are left out anyway.
 */
const STEEPEST_RAD = (85 * Math.PI) / 180;

/**
 * Errors of the view and of the film's index. A colour fixes the phase, that is thickness times
 * sqrt(n^2 - sin^2 i); so if index or incidence were other than assumed, every thickness in the cell changes by the ratio
 * of that root, and every area by the ratio of the cell's ground areas.
 * @param lostOrders largest share by which film seen at more than 60 degrees may be thicker than read: narrow bands are
 * lost there and read an order too thin. Each trial draws a share evenly from 0 to this.
 */
export function commonDraw(
  view: WaterView,
  cells: AreaCells,
  poses: PoseDraw,
  film: FilmIndex,
  lostOrders = 0,
): CommonDraw {
  const nominal = newCellView(cells);
  const drawn = newCellView(cells);
  lookFromCells(view, cells, nominal);
  return (random, areaFactor, thicknessFactor) => {
    lookFromCells(poses(random), cells, drawn);
    const index = film.index + film.indexSd * random.normal();
    const lost = lostOrders > 0 ? 1 + lostOrders * random.next() : 1;
    for (let cell = 0; cell < cells.count; cell++) {
      const before = nominal.incidenceRad[cell]!;
      const after = drawn.incidenceRad[cell]!;
      areaFactor[cell] =
        before < STEEPEST_RAD && after < STEEPEST_RAD ? drawn.areaM2[cell]! / nominal.areaM2[cell]! : 1;
      thicknessFactor[cell] =
        (phaseRoot(film.index, before) / phaseRoot(index, after)) * (before > WARNING_RAD ? lost : 1);
    }
  };
}

/** The same where the view is not in doubt, or not known well enough to say: only the index is drawn. */
export function indexDraw(film: FilmIndex, incidenceRad = 0): CommonDraw {
  return (random, areaFactor, thicknessFactor) => {
    areaFactor.fill(1);
    const index = film.index + film.indexSd * random.normal();
    thicknessFactor.fill(phaseRoot(film.index, incidenceRad) / phaseRoot(index, incidenceRad));
  };
}

/**
 * The same where only the size of a pixel on the water is known, straight down: one log-normal factor for all lengths, with
 * `lengthShare` as its standard deviation, and the index.
 */
export function scaleDraw(film: FilmIndex, lengthShare: number): CommonDraw {
  const index = indexDraw(film);
  return (random, areaFactor, thicknessFactor) => {
    index(random, areaFactor, thicknessFactor);
    areaFactor.fill(Math.exp(2 * lengthShare * random.normal()));
  };
}

/** n cos(angle inside the film), which is what the phase of a film goes by. */
function phaseRoot(index: number, incidenceRad: number): number {
  const sine = Math.sin(incidenceRad);
  return Math.sqrt(Math.max(1, index) ** 2 - sine * sine);
}
