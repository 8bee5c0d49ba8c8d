import { PIXEL_STATUS } from '../match/types.ts';
import { type FilmRegion, mustFit } from './filmRegion.ts';

/** Film area against thickness: `areaM2[i]` lies from i * stepNm up to (i + 1) * stepNm; the last bin holds the rest too. */
export interface ThicknessHistogram {
  readonly stepNm: number;
  readonly areaM2: Float64Array;
}

export interface OiledArea {
  /** All water in the region that the view can measure: oiled, bare and unread. */
  readonly regionM2: number;
  readonly oiledM2: number;
  readonly bareM2: number;
  /** Glint, foam, hulls and the like: no answer. Some of it may be oiled, some of it may not be water. */
  readonly unreadM2: number;
  /** Parts of the oiled area: past the resolvable range, and with two orders that fit alike. */
  readonly atLeastM2: number;
  readonly ambiguousM2: number;
  /** Pixels in the region without a ground area: seen too slanted, or above the horizon. */
  readonly excludedPixels: number;
  /** Oiled share of the water that gave an answer; NaN where none did. */
  readonly coverage: number;
  /** Were all unread water bare, and were all of it oiled. */
  readonly coverageLeast: number;
  readonly coverageMost: number;
  /** Of pixels with a thickness (measured and ambiguous); at-least pixels are not in it. */
  readonly histogram: ThicknessHistogram;
}

/**
 * Areas by what became of each pixel, from the map's status and the pixels' own ground areas.
 * @throws RangeError where the arrays do not fit the map
 */
export function oiledArea(film: FilmRegion, stepNm = 10, maxThicknessNm = 2000): OiledArea {
  mustFit(film);
  const { map, areaM2, region } = film;
  const { status, thicknessNm } = map;
  const bins = new Float64Array(Math.max(1, Math.ceil(maxThicknessNm / stepNm)));
  const byStatus = new Float64Array(6);
  let excludedPixels = 0;
  for (let i = 0; i < status.length; i++) {
    const code = status[i]!;
    if (code === PIXEL_STATUS.outside || region?.[i] === 0) {
      continue;
    }
    const area = areaM2[i]!;
    if (!(area > 0)) {
      excludedPixels++;
      continue;
    }
    byStatus[code]! += area;
    if (code === PIXEL_STATUS.measured || code === PIXEL_STATUS.ambiguous) {
      bins[Math.max(0, Math.min(bins.length - 1, Math.floor(thicknessNm[i]! / stepNm)))]! += area;
    }
  }
  const atLeastM2 = byStatus[PIXEL_STATUS.atLeast]!;
  const ambiguousM2 = byStatus[PIXEL_STATUS.ambiguous]!;
  const oiledM2 = byStatus[PIXEL_STATUS.measured]! + ambiguousM2 + atLeastM2;
  const bareM2 = byStatus[PIXEL_STATUS.bare]!;
  const unreadM2 = byStatus[PIXEL_STATUS.noFilmColour]!;
  const regionM2 = oiledM2 + bareM2 + unreadM2;
  return {
    regionM2,
    oiledM2,
    bareM2,
    unreadM2,
    atLeastM2,
    ambiguousM2,
    excludedPixels,
    coverage: oiledM2 / (oiledM2 + bareM2),
    coverageLeast: oiledM2 / regionM2,
    coverageMost: (oiledM2 + unreadM2) / regionM2,
    histogram: { stepNm, areaM2: bins },
  };
}
