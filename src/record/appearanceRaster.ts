import { PIXEL_STATUS, type ThicknessMap } from '../match/types.ts';
import { APPEARANCES } from '../tally/appearanceCode.ts';
import { LEAST_VISIBLE_UM } from '../tally/appearanceShares.ts';

/** Value of film that is too thin to have an appearance code. */
export const FILM_WITHOUT_CODE = 255;

/**
 * Appearance code of each pixel, by the rule of the tally's shares: 1 to 3 from thickness, 0 where no oil was read,
 * `FILM_WITHOUT_CODE` under 0.04 µm. Film past the resolvable range takes `atLeastCode`, or 3 where its lower bound says so.
 * Codes 4 and 5 are the observer's call and have no place on the map.
 * @param counts pixels that do not count (0) and that do; all where absent
 */
export function appearanceRaster(
  map: ThicknessMap,
  atLeastCode: 2 | 3 = 2,
  counts?: Uint8Array | Float32Array,
): Uint8Array {
  const { status, thicknessNm, lowNm } = map;
  const [sheenNm, rainbowNm, metallicNm] = [
    1000 * LEAST_VISIBLE_UM,
    1000 * APPEARANCES[1]!.minUm,
    1000 * APPEARANCES[2]!.minUm,
  ];
  const raster = new Uint8Array(status.length);
  for (let i = 0; i < raster.length; i++) {
    if (counts && !(counts[i]! > 0)) continue;
    if (status[i] === PIXEL_STATUS.atLeast) {
      raster[i] = lowNm[i]! >= metallicNm ? 3 : atLeastCode;
    } else if (status[i] === PIXEL_STATUS.measured || status[i] === PIXEL_STATUS.ambiguous) {
      const thickness = thicknessNm[i]!;
      raster[i] =
        thickness < sheenNm ? FILM_WITHOUT_CODE : thickness < rainbowNm ? 1 : thickness < metallicNm ? 2 : 3;
    }
  }
  return raster;
}
