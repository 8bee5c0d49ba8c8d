import { PIXEL_STATUS } from '../match/types.ts';
import type { AreaCells } from '../view/areaCells.ts';
import { type FilmRegion, mustFit } from './filmRegion.ts';

/** Half the width of a central 90 % interval in standard deviations of a normal distribution. */
const HALF_WIDTH_90 = 1.6448536269514722;

/** A second reading for ambiguous pixels: another order that fits, and the probability that it is the right one. */
export interface Alternatives {
  readonly thicknessNm: Float32Array;
  readonly share: Float32Array;
}

/**
 * All that the trials need to know of the pixels, summed over each cell of the photo: a Monte Carlo trial then costs a
 * few hundred multiplications, however many pixels there are.
 */
export interface CellSums {
  readonly cells: AreaCells;
  /** Area with a thickness (measured and ambiguous), m2, and its sum of thickness times area, nm m2. */
  readonly filmM2: Float64Array;
  readonly filmNmM2: Float64Array;
  /** Area past the resolvable range, m2, and its sum of lower bound times area, nm m2. */
  readonly atLeastM2: Float64Array;
  readonly atLeastNmM2: Float64Array;
  /** Sum of (area times standard deviation of thickness) squared over pixels with a thickness, nm2 m4. */
  readonly varianceNm2M4: Float64Array;
  readonly ambiguousM2: Float64Array;
  /** What the sum would gain, nm m2, were every ambiguous pixel of the cell its alternative, and how probable that is. */
  readonly switchNmM2: Float64Array;
  readonly switchShare: Float64Array;
  /** Bare water, m2, and what gave no answer though it lies in the region. */
  readonly bareM2: Float64Array;
  readonly unreadM2: Float64Array;
}

/**
 * Sums the film over the cells. The standard deviation of one pixel is its 90 % interval's width over 3.29.
 * @throws RangeError where the arrays or cells do not fit the map
 */
export function cellSums(film: FilmRegion, cells: AreaCells, alternatives?: Alternatives): CellSums {
  mustFit(film);
  const { map, areaM2, region } = film;
  if (cells.columnOf.length !== map.width || cells.rowOf.length !== map.height) {
    throw new RangeError('The cells were made for a photo of another size than the map.');
  }
  const { status, thicknessNm, lowNm, highNm, width, height } = map;
  const zeros = () => new Float64Array(cells.count);
  const sums = {
    filmM2: zeros(),
    filmNmM2: zeros(),
    atLeastM2: zeros(),
    atLeastNmM2: zeros(),
    varianceNm2M4: zeros(),
    ambiguousM2: zeros(),
    switchNmM2: zeros(),
    switchShare: zeros(),
    bareM2: zeros(),
    unreadM2: zeros(),
  };
  for (let y = 0; y < height; y++) {
    const firstCell = cells.rowOf[y]! * cells.columns;
    for (let x = 0; x < width; x++) {
      const i = y * width + x;
      const code = status[i]!;
      const area = areaM2[i]!;
      if (!(area > 0) || region?.[i] === 0) {
        continue;
      }
      const cell = firstCell + cells.columnOf[x]!;
      if (code === PIXEL_STATUS.measured || code === PIXEL_STATUS.ambiguous) {
        const thickness = thicknessNm[i]!;
        const spread = (area * (highNm[i]! - lowNm[i]!)) / (2 * HALF_WIDTH_90);
        sums.filmM2[cell]! += area;
        sums.filmNmM2[cell]! += area * thickness;
        sums.varianceNm2M4[cell]! += spread * spread;
        if (code === PIXEL_STATUS.ambiguous) {
          sums.ambiguousM2[cell]! += area;
          if (alternatives && alternatives.share[i]! > 0) {
            sums.switchNmM2[cell]! += area * (alternatives.thicknessNm[i]! - thickness);
            sums.switchShare[cell]! += area * alternatives.share[i]!;
          }
        }
      } else if (code === PIXEL_STATUS.atLeast) {
        sums.atLeastM2[cell]! += area;
        sums.atLeastNmM2[cell]! += area * lowNm[i]!;
      } else if (code === PIXEL_STATUS.bare) {
        sums.bareM2[cell]! += area;
      } else if (code === PIXEL_STATUS.noFilmColour) {
        sums.unreadM2[cell]! += area;
      }
    }
  }
  for (let cell = 0; cell < cells.count; cell++) {
    if (sums.ambiguousM2[cell]! > 0) {
      sums.switchShare[cell]! /= sums.ambiguousM2[cell]!;
    }
  }
  return { cells, ...sums };
}
